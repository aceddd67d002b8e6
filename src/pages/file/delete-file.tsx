import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { sentenceOf } from '../../api/api-error'
import { useDeleteFile } from '../../api/files'
import { Button } from '../../components/ui/button'
import { ConfirmByName } from '../../components/ui/confirm-by-name'
import { countWords } from '../../lib/format'

export function DeleteFile({ file }: { file: OffingFile }) {
  const [open, setOpen] = useState(false)
  const remove = useDeleteFile(file.id)
  const navigate = useNavigate()
  const layers = file.layers.length > 0 ? ` and its ${countWords(file.layers.length, 'layer')}` : ''
  return (
    <div className="border-t border-rule pt-4" data-no-print>
      <Button kind="danger" size="small" onClick={() => setOpen(true)}>
        Delete this file…
      </Button>
      <ConfirmByName
        open={open}
        onOpenChange={setOpen}
        title="Delete this file"
        about={`The file${layers} are taken out; the days they showed are worked out and judged again without them.`}
        name={file.name}
        act="Delete the file"
        busy={remove.isPending}
        error={remove.error ? sentenceOf(remove.error) : undefined}
        onConfirm={() => remove.mutate(undefined, { onSuccess: () => void navigate(paths.layers.to()) })}
      />
    </div>
  )
}
