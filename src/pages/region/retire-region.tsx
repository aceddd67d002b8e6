import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Region } from '../../../shared/schemas/regions'
import { sentenceOf } from '../../api/api-error'
import { useRetireRegion } from '../../api/regions'
import { Button } from '../../components/ui/button'
import { ConfirmByName } from '../../components/ui/confirm-by-name'

export function RetireRegion({ region }: { region: Region }) {
  const [open, setOpen] = useState(false)
  const retire = useRetireRegion(region.id)
  const navigate = useNavigate()
  return (
    <div className="border-t border-rule pt-4" data-no-print>
      <Button kind="danger" size="small" onClick={() => setOpen(true)}>
        Retire {region.name}…
      </Button>
      <ConfirmByName
        open={open}
        onOpenChange={setOpen}
        title={`Retire ${region.name}`}
        about="Nothing new is read, judged or told for it. Its outline, figures, events and alerts stay."
        name={region.name}
        act={`Retire ${region.name}`}
        busy={retire.isPending}
        error={retire.error ? sentenceOf(retire.error) : undefined}
        onConfirm={() => retire.mutate(undefined, { onSuccess: () => void navigate(paths.regions.to()) })}
      />
    </div>
  )
}
