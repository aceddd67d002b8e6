import { useInfiniteQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { type FileItem, fileStatuses, type FileStatus } from '../../../shared/schemas/files'
import { filesQuery } from '../../api/files'
import { Age } from '../../components/ui/age'
import { Button } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { megabytes } from '../../lib/format'
import { FileStatusWord } from './file-status'

type Shown = FileStatus | 'all'
const options = (['all', ...fileStatuses] as const).map((value) => ({ value, label: value }))

/** Files newest first; what happens to them shows by itself. */
export function FileList() {
  const [shown, setShown] = useState<Shown>('all')
  const files = useInfiniteQuery(filesQuery(shown === 'all' ? undefined : shown))
  const items = files.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <>
      <Choice label="Status" options={options} value={shown} onChange={setShown} />
      {files.isPending && <Waiting lines={5} />}
      {files.error && <Failure error={files.error} onRetry={() => void files.refetch()} />}
      {files.isSuccess && items.length === 0 && (
        <Empty title={shown === 'all' ? 'No file yet.' : `No file is ${shown}.`}>
          {shown === 'all' && 'Send one above, drop one into the watched folder, or send it with a token.'}
        </Empty>
      )}
      {items.length > 0 && (
        <Table label="Files">
          <thead>
            <tr>
              <Th>File</Th>
              <Th>Status</Th>
              <Th figures className="hidden tab:table-cell">
                Size
              </Th>
              <Th className="hidden desk:table-cell">Came by</Th>
              <Th figures>Received</Th>
            </tr>
          </thead>
          <tbody>
            {items.map((file) => (
              <FileRow key={file.id} file={file} />
            ))}
          </tbody>
        </Table>
      )}
      {files.hasNextPage && (
        <div>
          <Button kind="text" disabled={files.isFetchingNextPage} onClick={() => void files.fetchNextPage()}>
            Older files
          </Button>
        </div>
      )}
    </>
  )
}

function FileRow({ file }: { file: FileItem }) {
  return (
    <Tr>
      <Td className="max-w-[min(26rem,60vw)]">
        <Link className="link fig font-strong break-all" to={paths.file.to({ id: file.id })}>
          {file.name}
        </Link>
        <FileSentence file={file} />
      </Td>
      <Td>
        <FileStatusWord status={file.status} />
        {file.progress && file.status === 'processing' && (
          <span className="fig block text-fine text-ink2">
            {file.progress.done} of {file.progress.total} layers
          </span>
        )}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {megabytes(file.bytes)}
      </Td>
      <Td className="hidden desk:table-cell">{cameBy(file)}</Td>
      <Td figures>
        <Age at={file.receivedAt} />
      </Td>
    </Tr>
  )
}

function FileSentence({ file }: { file: FileItem }) {
  const sentence = file.refusal?.message ?? file.waitingFor
  return sentence ? <span className="block text-fine text-ink2">{sentence}</span> : null
}

function cameBy(file: FileItem): string {
  if (file.origin === 'inbox') return 'watched folder'
  if (file.origin === 'command') return 'command'
  if (file.origin === 'pull') return 'fetched'
  return file.uploadedBy?.name ?? 'upload'
}
