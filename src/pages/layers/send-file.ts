import type { z } from 'zod'
import { endpoints } from '../../../shared/schemas/endpoints'
import { errorReply } from '../../../shared/schemas/common'
import type { receipt } from '../../../shared/schemas/files'
import { ApiError } from '../../api/api-error'
import { renewSession } from '../../api/session'

export type Receipt = z.infer<typeof receipt>

export interface SendFields {
  feedId?: number
  /** Used only where the file has no time of its own. */
  observedAt?: string
}

export interface Sending {
  file: File
  fields: SendFields
  onProgress: (sentBytes: number) => void
  signal: AbortSignal
}

/** Sends one file with its progress; fetch cannot tell how much has gone out. Renews a session that ran out, once. */
export async function sendFile(sending: Sending): Promise<Receipt> {
  let reply = await request(sending)
  if (reply.status === 401 && (await renewSession())) reply = await request(sending)
  if (reply.status >= 400 || reply.status === 0) throw refusal(reply)
  const read = endpoints.uploadFiles.reply.safeParse(reply.body)
  const receipt = read.data?.items[0]
  if (!receipt) throw new ApiError('unreadable-reply', 'The server took the file but its answer cannot be read.', {}, reply.status)
  return receipt
}

interface Reply {
  status: number
  body: unknown
}

function request({ file, fields, onProgress, signal }: Sending): Promise<Reply> {
  return new Promise((resolve, reject) => {
    const xhr = new XMLHttpRequest()
    xhr.open(endpoints.uploadFiles.method, `/api${endpoints.uploadFiles.path}`)
    xhr.upload.addEventListener('progress', (event) => onProgress(Math.min(event.loaded, file.size)))
    xhr.addEventListener('load', () => resolve({ status: xhr.status, body: parsed(xhr.responseText) }))
    xhr.addEventListener('error', () => resolve({ status: 0, body: undefined }))
    xhr.addEventListener('abort', () => reject(new DOMException('Stopped', 'AbortError')))
    signal.addEventListener('abort', () => xhr.abort(), { once: true })
    xhr.send(formOf(file, fields))
  })
}

/** Fields come before the file, so that they are known when its first byte arrives. */
function formOf(file: File, { feedId, observedAt }: SendFields): FormData {
  const form = new FormData()
  if (feedId !== undefined) form.append('feedId', String(feedId))
  if (observedAt !== undefined) form.append('observedAt', observedAt)
  form.append('file', file, file.name)
  return form
}

function refusal({ status, body }: Reply): ApiError {
  if (status === 0) {
    return new ApiError('no-connection', 'The connection broke before the whole file was sent; nothing of it was kept. Send it again.')
  }
  const read = errorReply.safeParse(body)
  if (!read.success) return new ApiError('server-error', `The server did not take the file (status ${status}).`, {}, status)
  return new ApiError('server-error', read.data.error.message, read.data.error.details, status)
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}
