import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { Message } from '../../components/ui/message'
import { dayWithYear } from '../../lib/dates'
import { countWords } from '../../lib/format'

/** Which file this one took the place of, and which took the place of its layers. */
export function ReplacedPart({ file }: { file: OffingFile }) {
  const all = file.layers.every((layer) => layer.replaced)
  return (
    <>
      {file.replacedBy?.map((newer) => (
        <Message key={newer.id} title={all ? 'This file was replaced.' : `${countWords(newer.layers, 'layer')} of this file ${newer.layers === 1 ? 'was' : 'were'} replaced.`}>
          Replaced by <FileLink file={newer} />
          {newer.name === file.name && ', a newer file of the same name,'} on {dayWithYear(newer.at)}. {all ? 'It' : 'What was replaced'} is kept, but takes no part in any figure.
        </Message>
      ))}
      {file.replaces && file.status === 'processed' && (
        <p className="text-small text-ink2">
          It came under the same address as <FileLink file={file.replaces} />
          {file.replaces.name === file.name && ', an older file of the same name,'} and took its place.
        </p>
      )}
    </>
  )
}

function FileLink({ file }: { file: { id: number; name: string } }) {
  return (
    <Link className="link fig wrap-anywhere" to={paths.file.to({ id: file.id })}>
      {file.name}
    </Link>
  )
}
