import type { Request, RequestHandler } from 'express'
import multer, { MulterError, type StorageEngine } from 'multer'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { dropFile, storeStream, TooLarge, type Arrived } from '../pipeline/stored-files'

const mostFiles = 200

/** multer copies what storing answers onto a new file object; the arrival travels with it. */
type StoredFile = Express.Multer.File & { arrived?: Arrived }

/** Takes multipart uploads straight to disk, checksummed on the way; what is cut off leaves nothing behind. */
export function upload(context: Context): RequestHandler {
  const storage: StorageEngine = {
    _handleFile: (_req, file, done) => {
      storeStream(context.env, file.stream).then(
        (arrived) => {
          const stored: Partial<StoredFile> = { size: arrived.bytes, path: arrived.temporary, arrived }
          done(null, stored)
        },
        (error: unknown) => done(error),
      )
    },
    _removeFile: (_req, file: StoredFile, done) => {
      const { arrived } = file
      void (arrived ? dropFile(arrived) : Promise.resolve()).then(() => done(null), done)
    },
  }
  const receive = multer({ storage, limits: { files: mostFiles, fields: 20, fieldSize: 1_000 }, defParamCharset: 'utf8' }).array('file')
  return (req, res, next) => {
    receive(req, res, (error: unknown) => next(error ? asApiError(error) : undefined))
  }
}

/** The files of a request in the order they were sent. */
export function arrivedFiles(req: Request): { name: string; arrived: Arrived }[] {
  const files: StoredFile[] = Array.isArray(req.files) ? req.files : []
  return files.flatMap(({ originalname, arrived }) => (arrived ? [{ name: originalname.slice(-200), arrived }] : []))
}

function asApiError(error: unknown): unknown {
  if (error instanceof TooLarge) return new ApiError('too-large', `${error.message} Nothing of it was kept.`)
  if (!(error instanceof MulterError)) return error
  if (error.code === 'LIMIT_FILE_COUNT') return new ApiError('too-large', `At most ${mostFiles} files can be sent at once.`)
  if (error.code === 'LIMIT_UNEXPECTED_FILE') return new ApiError('bad-request', 'Files are sent in the field "file".')
  return new ApiError('bad-request', `The upload could not be read: ${error.message}.`)
}
