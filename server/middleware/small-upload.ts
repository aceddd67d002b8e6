import type { Request, RequestHandler } from 'express'
import multer, { MulterError } from 'multer'
import { ApiError } from '../api-error'

/** Takes one multipart file of bounded size into memory, in the field "file". */
export function smallUpload(mostMegabytes: number): RequestHandler {
  const receive = multer({ storage: multer.memoryStorage(), limits: { files: 1, fields: 5, fieldSize: 1_000, fileSize: mostMegabytes * 1024 * 1024 }, defParamCharset: 'utf8' }).single('file')
  return (req, res, next) => {
    receive(req, res, (error: unknown) => next(error instanceof MulterError ? asApiError(error, mostMegabytes) : error))
  }
}

function asApiError(error: MulterError, mostMegabytes: number): ApiError {
  if (error.code === 'LIMIT_FILE_SIZE') return new ApiError('too-large', `The file is larger than ${mostMegabytes} MB. Nothing of it was kept.`)
  if (error.code === 'LIMIT_FILE_COUNT') return new ApiError('bad-request', 'One file is taken at a time.')
  if (error.code === 'LIMIT_UNEXPECTED_FILE') return new ApiError('bad-request', 'The file is sent in the field "file", and one at a time.')
  return new ApiError('bad-request', `The upload could not be read: ${error.message}.`)
}

export function smallFile(req: Request): { name: string; bytes: Buffer } {
  if (!req.file) throw new ApiError('bad-request', 'No file came with the request. It is sent in the field "file".')
  return { name: req.file.originalname.slice(-200), bytes: req.file.buffer }
}
