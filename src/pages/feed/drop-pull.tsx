import { useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import { sentenceOf } from '../../api/api-error'
import { useDropPull } from '../../api/pulls'
import { Button } from '../../components/ui/button'
import { ConfirmByName } from '../../components/ui/confirm-by-name'

export function DropPull({ feed }: { feed: Pick<Feed, 'id' | 'name'> }) {
  const [open, setOpen] = useState(false)
  const drop = useDropPull(feed.id)
  return (
    <>
      <Button kind="danger" size="small" onClick={() => setOpen(true)}>
        Fetch no more…
      </Button>
      <ConfirmByName
        open={open}
        onOpenChange={setOpen}
        title={`${feed.name} fetches no more`}
        about="Its address and credentials are forgotten. The files it fetched stay."
        name={feed.name}
        act="Fetch no more"
        busy={drop.isPending}
        error={drop.error ? sentenceOf(drop.error) : undefined}
        onConfirm={() => drop.mutate(undefined, { onSuccess: () => setOpen(false) })}
      />
    </>
  )
}
