import { fromBuffer, type Entry, type ZipFile } from 'yauzl'
import { AreaFileRefused } from './area-file'

const mostEntries = 2_000
/** What the wanted entries may unfold to, all together. */
const mostBytes = 64 * 1024 * 1024

/**
 * The wanted entries of a zip by name, each unfolded in memory. What an entry unfolds to is counted while it is read,
 * whatever its header claims.
 */
export async function zipEntries(zip: Buffer, wanted: (name: string) => boolean): Promise<Map<string, Buffer>> {
  const file = await opened(zip)
  if (file.entryCount > mostEntries) throw new AreaFileRefused(`The zip holds ${file.entryCount.toLocaleString('en-GB')} entries; at most ${mostEntries.toLocaleString('en-GB')} are looked at.`)
  const found = new Map<string, Buffer>()
  let room = mostBytes
  return new Promise((resolve, reject) => {
    const fail = (error: unknown) => {
      file.close()
      reject(error instanceof AreaFileRefused ? error : new AreaFileRefused('The zip is damaged or cut off.'))
    }
    file.on('error', fail)
    file.on('end', () => resolve(found))
    file.on('entry', (entry: Entry) => {
      const name = entry.fileName
      if (name.endsWith('/') || name.startsWith('__MACOSX/') || !wanted(name)) return file.readEntry()
      if (entry.isEncrypted()) return fail(new AreaFileRefused('The zip is protected by a password; send it without one.'))
      readEntry(file, entry, room).then((bytes) => {
        room -= bytes.length
        found.set(name, bytes)
        file.readEntry()
      }, fail)
    })
    file.readEntry()
  })
}

function opened(zip: Buffer): Promise<ZipFile> {
  return new Promise((resolve, reject) => {
    fromBuffer(zip, { lazyEntries: true }, (error, file) => (error ? reject(new AreaFileRefused('The zip is damaged or cut off.')) : resolve(file)))
  })
}

function readEntry(file: ZipFile, entry: Entry, room: number): Promise<Buffer> {
  const tooLarge = () => new AreaFileRefused(`The zip unfolds to more than ${mostBytes / 1024 / 1024} MB; nothing of it was kept.`)
  if (entry.uncompressedSize > room) return Promise.reject(tooLarge())
  return new Promise((resolve, reject) => {
    file.openReadStream(entry, (error, stream) => {
      if (error) return reject(error)
      const chunks: Buffer[] = []
      let length = 0
      stream.on('error', reject)
      stream.on('data', (chunk: Buffer) => {
        length += chunk.length
        if (length > room) stream.destroy(tooLarge())
        else chunks.push(chunk)
      })
      stream.on('end', () => resolve(Buffer.concat(chunks)))
    })
  })
}
