import { countWords } from '../../lib/format'
import { useUploadList } from './uploads-context'

/** While files are being sent, every page says so at its foot; the room of layers has the whole list and hides it. */
export function UploadNote() {
  const going = useUploadList().filter((one) => one.state === 'sending' || one.state === 'queued')
  if (going.length === 0) return null
  const bytes = going.reduce((sum, one) => sum + one.bytes, 0)
  const sent = going.reduce((sum, one) => sum + one.sent, 0)
  const share = bytes > 0 ? sent / bytes : 0
  return (
    <div
      data-upload-note
      className="fixed bottom-16 left-4 z-[1100] w-56 border border-ink bg-paper p-2 text-small tab:bottom-4 tab:left-8"
    >
      <div aria-hidden className="mb-1 h-2 border border-ink">
        <div className="h-full bg-ink" style={{ width: `${share * 100}%` }} />
      </div>
      Sending {countWords(going.length, 'file')}, <span className="fig">{Math.floor(share * 100)} %</span>
    </div>
  )
}
