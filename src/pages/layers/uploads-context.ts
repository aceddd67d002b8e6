import { createContext, useContext, useSyncExternalStore } from 'react'
import type { Upload, Uploads } from './uploads'

export const UploadsContext = createContext<Uploads | null>(null)

export function useUploads(): Uploads {
  const uploads = useContext(UploadsContext)
  if (!uploads) throw new Error('uploads are used outside their provider')
  return uploads
}

export function useUploadList(): readonly Upload[] {
  const uploads = useUploads()
  return useSyncExternalStore(uploads.subscribe, uploads.list)
}
