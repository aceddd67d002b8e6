import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { Button } from '../../components/ui/button'
import { FaultMark } from '../../components/ui/fault-mark'
import { megabytes } from '../../lib/format'
import type { Upload } from './uploads'
import { useUploadList, useUploads } from './uploads-context'

/** What is being sent from this browser, file by file. */
export function UploadList() {
  const uploads = useUploads()
  const list = useUploadList()
  if (list.length === 0) return null
  const over = list.some((one) => one.state !== 'sending' && one.state !== 'queued')
  return (
    <div className="grid gap-2">
      <ul aria-label="Files being sent">
        {list.map((upload) => (
          <UploadRow key={upload.key} upload={upload} />
        ))}
      </ul>
      {over && (
        <div>
          <Button kind="text" size="small" onClick={uploads.forget}>
            Put away what is finished
          </Button>
        </div>
      )}
    </div>
  )
}

function UploadRow({ upload }: { upload: Upload }) {
  const uploads = useUploads()
  const share = upload.bytes > 0 ? upload.sent / upload.bytes : 0
  return (
    <li className="flex min-h-13 flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-2 text-small tab:min-h-11">
      <span className="fig min-w-0 flex-1 basis-60 truncate">{upload.name}</span>
      <span className="fig w-18 text-right text-ink2">{megabytes(upload.bytes)}</span>
      <div className="flex min-w-0 basis-full items-center gap-3 tab:basis-96">
        {(upload.state === 'sending' || upload.state === 'queued') && (
          <>
            <div
              role="progressbar"
              aria-label={`Sending ${upload.name}`}
              aria-valuemin={0}
              aria-valuemax={100}
              aria-valuenow={Math.floor(share * 100)}
              className="h-2 flex-1 border border-ink"
            >
              <div className="h-full bg-ink" style={{ width: `${share * 100}%` }} />
            </div>
            <span className="fig w-14 text-right">{upload.state === 'queued' ? 'queued' : `${Math.floor(share * 100)} %`}</span>
            <Button kind="text" size="small" onClick={() => uploads.stop(upload.key)}>
              Stop
            </Button>
          </>
        )}
        {upload.state === 'received' && upload.fileId !== undefined && (
          <span>
            received,{' '}
            <Link className="link font-strong" to={paths.file.to({ id: upload.fileId })}>
              see what is made of it
            </Link>
          </span>
        )}
        {(upload.state === 'failed' || upload.state === 'stopped') && (
          <span role="alert" className="flex min-w-0 flex-1 items-start gap-2">
            <FaultMark />
            <span className="min-w-0 flex-1">{upload.problem ?? 'Stopped; nothing of it was kept.'}</span>
            <Button kind="text" size="small" onClick={() => uploads.retry(upload.key)}>
              Send again
            </Button>
          </span>
        )}
      </div>
    </li>
  )
}
