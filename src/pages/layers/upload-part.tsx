import { useId, useRef, useState, type DragEvent } from 'react'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { FieldsForPlainFiles, type PlainFields, sendFieldsOf } from './fields-for-plain-files'
import { UploadList } from './upload-list'
import { useUploads } from './uploads-context'

/** Files dropped here or chosen are sent at once. */
export function UploadPart() {
  const uploads = useUploads()
  const chooser = useRef<HTMLInputElement>(null)
  const heading = useId()
  const [over, setOver] = useState(false)
  const [fields, setFields] = useState<PlainFields>({ feedId: '', observedAt: '' })

  function send(files: FileList | null) {
    if (files && files.length > 0) uploads.add([...files], sendFieldsOf(fields))
  }

  function drop(event: DragEvent) {
    event.preventDefault()
    setOver(false)
    send(event.dataTransfer.files)
  }

  return (
    <section aria-labelledby={heading} className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead>
        <span id={heading}>Send files</span>
      </SectionHead>
      <div
        onDragOver={(event) => {
          event.preventDefault()
          setOver(true)
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
        className={`flex flex-wrap items-center gap-x-5 gap-y-3 border border-dashed px-4 py-5 ${over ? 'border-accent bg-accentTint' : 'border-rule2'}`}
      >
        <Button kind="filled" onClick={() => chooser.current?.click()}>
          Choose files
        </Button>
        <p className="min-w-0 flex-1 basis-64 text-ink2">
          or drop them here: NetCDF-4, classic NetCDF or GeoTIFF. They go on being sent while you turn to other pages.
        </p>
        <input
          ref={chooser}
          type="file"
          multiple
          aria-label="Files to send"
          className="heard"
          tabIndex={-1}
          onChange={(event) => {
            send(event.target.files)
            event.target.value = ''
          }}
        />
      </div>
      <FieldsForPlainFiles fields={fields} onChange={setFields} />
      <UploadList />
    </section>
  )
}
