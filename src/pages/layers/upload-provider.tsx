import { useQueryClient } from '@tanstack/react-query'
import { useEffect, useState, type ReactNode } from 'react'
import { sendFile } from './send-file'
import { makeUploads } from './uploads'
import { UploadsContext } from './uploads-context'
import { UploadNote } from './upload-note'

/** Stands above the pages: files go on being sent while people turn to other rooms. */
export function UploadProvider({ children }: { children: ReactNode }) {
  const client = useQueryClient()
  const [uploads] = useState(() => makeUploads(sendFile, () => void client.invalidateQueries({ queryKey: ['files'] })))
  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (uploads.list().some((one) => one.state === 'sending' || one.state === 'queued')) event.preventDefault()
    }
    window.addEventListener('beforeunload', warn)
    return () => window.removeEventListener('beforeunload', warn)
  }, [uploads])
  return (
    <UploadsContext value={uploads}>
      {children}
      <UploadNote />
    </UploadsContext>
  )
}
