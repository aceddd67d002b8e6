import { useRef, useState, type DragEvent } from 'react'
import { Button } from '../../components/ui/button'

/** One file, chosen or dropped, read at once. */
export function ChooseFile({ again, onFile }: { again: boolean; onFile: (file: File) => void }) {
  const chooser = useRef<HTMLInputElement>(null)
  const [over, setOver] = useState(false)

  function drop(event: DragEvent) {
    event.preventDefault()
    setOver(false)
    const [file] = event.dataTransfer.files
    if (file) onFile(file)
  }

  return (
    <div
      onDragOver={(event) => {
        event.preventDefault()
        setOver(true)
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
      className={`flex flex-wrap items-center gap-x-5 gap-y-3 border border-dashed px-4 py-5 ${over ? 'border-accent bg-accentTint' : 'border-rule2'}`}
    >
      <Button kind={again ? 'outline' : 'filled'} onClick={() => chooser.current?.click()}>
        {again ? 'Choose another file' : 'Choose a file'}
      </Button>
      <p className="min-w-0 flex-1 basis-64 text-ink2">or drop it here. A shapefile is sent as a zip with its .shp, .dbf and .prj.</p>
      <input
        ref={chooser}
        type="file"
        accept=".geojson,.json,.kml,.kmz,.zip"
        aria-label="File of outlines"
        className="heard"
        tabIndex={-1}
        onChange={(event) => {
          const file = event.target.files?.[0]
          if (file) onFile(file)
          event.target.value = ''
        }}
      />
    </div>
  )
}
