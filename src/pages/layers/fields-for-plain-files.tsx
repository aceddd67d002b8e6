import { useQuery } from '@tanstack/react-query'
import { feedsQuery } from '../../api/feeds'
import { SelectField, TextField } from '../../components/ui/field'
import type { SendFields } from './send-file'

export interface PlainFields {
  feedId: string
  /** As the browser's field gives it, read as UTC. */
  observedAt: string
}

export function sendFieldsOf({ feedId, observedAt }: PlainFields): SendFields {
  return {
    ...(feedId === '' ? {} : { feedId: Number(feedId) }),
    ...(observedAt === '' ? {} : { observedAt: `${observedAt}:00Z` }),
  }
}

/** A GeoTIFF often tells neither its feed nor its time; these two words go with the files sent next. */
export function FieldsForPlainFiles({ fields, onChange }: { fields: PlainFields; onChange: (fields: PlainFields) => void }) {
  const feeds = useQuery(feedsQuery()).data?.items.filter((feed) => !feed.retired) ?? []
  return (
    <details>
      <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">Files that do not tell their feed or time</summary>
      <div className="mt-3 grid max-w-3xl gap-4 tab:grid-cols-2">
        <SelectField
          label="Feed"
          hint="For the files sent next. Left open, the file is matched by what it holds."
          value={fields.feedId}
          onChange={(event) => onChange({ ...fields, feedId: event.target.value })}
        >
          <option value="">as the file says</option>
          {feeds.map((feed) => (
            <option key={feed.id} value={feed.id}>
              {feed.name}
            </option>
          ))}
        </SelectField>
        <TextField
          type="datetime-local"
          label="Observed at, UTC"
          hint="Used only where a file has no time of its own."
          value={fields.observedAt}
          onChange={(event) => onChange({ ...fields, observedAt: event.target.value })}
        />
      </div>
    </details>
  )
}
