import { useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import { sentenceOf } from '../../api/api-error'
import { useChangeFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { ConfirmByName } from '../../components/ui/confirm-by-name'

export function RetireFeed({ feed }: { feed: Feed }) {
  const [open, setOpen] = useState(false)
  const change = useChangeFeed(feed.id)
  return (
    <div>
      <Button kind="danger" size="small" onClick={() => setOpen(true)}>
        Retire this feed…
      </Button>
      <ConfirmByName
        open={open}
        onOpenChange={setOpen}
        title={`Retire ${feed.name}`}
        about="New files are not matched with it and its rules judge nothing new. Its layers and figures stay."
        name={feed.name}
        act="Retire the feed"
        busy={change.isPending}
        error={change.error ? sentenceOf(change.error) : undefined}
        onConfirm={() => change.mutate({ version: feed.version, retired: true }, { onSuccess: () => setOpen(false) })}
      />
    </div>
  )
}
