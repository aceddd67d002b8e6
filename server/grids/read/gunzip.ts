import { createReadStream, createWriteStream, closeSync, fstatSync, openSync, rmSync, statfsSync } from 'node:fs'
import { Transform } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { createGunzip } from 'node:zlib'
import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'
import { maxExpandedBytes } from './limits'

/** Deflate cannot pack more tightly than this. */
const largestRatio = 1032
const spareBytes = 256 * 1024 * 1024
let made = 0

export function isGzip(path: string): boolean {
  const descriptor = openSync(path, 'r')
  try {
    const head = readExactly(descriptor, 0, Math.min(3, fstatSync(descriptor).size))
    return head.length === 3 && head[0] === 0x1f && head[1] === 0x8b && head[2] === 8
  } finally {
    closeSync(descriptor)
  }
}

/**
 * Expands a gzip file into a temporary file beside it and answers its path; the caller removes it. Both the size it
 * declares and the size it turns out to have are bounded, and gzip's own checksum is tested.
 */
export async function gunzipBeside(path: string, fileName: string, limit = maxExpandedBytes): Promise<string> {
  checkDeclaredSize(path, fileName, limit)
  const target = `${path}.expanded-${process.pid}-${++made}`
  let expanded = 0
  const counting = new Transform({
    transform(chunk: Buffer, _, done) {
      expanded += chunk.length
      done(expanded > limit ? tooLarge(fileName, expanded, limit) : null, chunk)
    },
  })
  try {
    await pipeline(createReadStream(path), createGunzip(), counting, createWriteStream(target, { flags: 'wx', mode: 0o600 }))
    return target
  } catch (error) {
    rmSync(target, { force: true })
    throw refused(error, fileName)
  }
}

/** The last four bytes hold the size modulo 4 GB: too small a number to trust, but a large one is believed. */
function checkDeclaredSize(path: string, fileName: string, limit: number): void {
  const descriptor = openSync(path, 'r')
  try {
    const fileSize = fstatSync(descriptor).size
    if (fileSize < 18) throw cutShort(fileName)
    const declared = readExactly(descriptor, fileSize - 4, 4).readUInt32LE(0)
    if (declared > limit) throw tooLarge(fileName, declared, limit)
    if (declared > fileSize * largestRatio) {
      throw new LayerRefused('damaged', 'This gzip file declares more than it can hold.', { fileName, declared, fileSize })
    }
    const disk = statfsSync(path)
    if (declared + spareBytes > disk.bavail * disk.bsize) {
      throw new LayerRefused('reading-failed', 'There is not enough room on the disk to unpack this gzip file.', {
        fileName, declared,
      })
    }
  } finally {
    closeSync(descriptor)
  }
}

function refused(error: unknown, fileName: string): unknown {
  if (error instanceof LayerRefused || !(error instanceof Error)) return error
  const code = 'code' in error ? String(error.code) : ''
  if (code === 'Z_BUF_ERROR') return cutShort(fileName, error)
  if (!code.startsWith('Z_')) return error
  return new LayerRefused('damaged', 'This gzip file is damaged and cannot be unpacked.', { fileName, reason: error.message }, {
    cause: error,
  })
}

function cutShort(fileName: string, cause?: unknown): LayerRefused {
  return new LayerRefused('truncated', 'This gzip file is not whole: it ends before its data do.', { fileName }, { cause })
}

function tooLarge(fileName: string, bytes: number, limit: number): LayerRefused {
  return new LayerRefused(
    'too-large',
    `This gzip file expands to more than ${Math.round(limit / 2 ** 20)} MB, more than Offing unpacks.`,
    { fileName, bytes, limit },
  )
}
