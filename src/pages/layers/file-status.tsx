import type { FileStatus } from '../../../shared/schemas/files'
import { FaultMark } from '../../components/ui/fault-mark'

/** The marks of files, kin to the progress rule: empty, filling, full; a question; the square of faults. */
export function FileStatusWord({ status }: { status: FileStatus }) {
  return (
    <span className="inline-flex items-center gap-2 align-middle whitespace-nowrap">
      <StatusMark status={status} />
      {status}
    </span>
  )
}

const filled: Partial<Record<FileStatus, number>> = { received: 0, processing: 7, processed: 14 }

function StatusMark({ status }: { status: FileStatus }) {
  if (status === 'refused') return <FaultMark />
  const width = filled[status]
  return (
    <svg aria-hidden width="18" height="18" viewBox="0 0 18 18" className="shrink-0">
      <rect x="1.5" y="5.5" width="15" height="7" fill="none" stroke="currentColor" strokeDasharray={status === 'waiting' ? '3 2' : undefined} />
      {width !== undefined && width > 0 && <rect x="2" y="6" width={width} height="6" fill="currentColor" />}
    </svg>
  )
}
