import { mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { caughtLetter, type CaughtLetter } from '../../shared/schemas/duty'

const keep = 500

export interface CaughtStore {
  add(letter: Omit<CaughtLetter, 'id'>): Promise<CaughtLetter>
  /** Newest first. */
  list(): CaughtLetter[]
  get(id: string): CaughtLetter | undefined
}

/** The newest letters in memory, each also a file, so that a restart keeps them. */
export async function openCaughtStore(dir: string): Promise<CaughtStore> {
  await mkdir(dir, { recursive: true })
  const letters = await readAll(dir)
  let last = Number(letters.at(-1)?.id ?? 0)

  const forgetOldest = async () => {
    for (const letter of letters.splice(0, Math.max(0, letters.length - keep))) await rm(fileOf(dir, letter.id), { force: true })
  }
  await forgetOldest()

  return {
    add: async (arrived) => {
      last += 1
      const letter = { ...arrived, id: String(last).padStart(8, '0') }
      const file = fileOf(dir, letter.id)
      await writeFile(`${file}.part`, JSON.stringify(letter))
      await rename(`${file}.part`, file)
      letters.push(letter)
      await forgetOldest()
      return letter
    },
    list: () => letters.toReversed(),
    get: (id) => letters.find((letter) => letter.id === id),
  }
}

const fileOf = (dir: string, id: string) => join(dir, `${id}.json`)

async function readAll(dir: string): Promise<CaughtLetter[]> {
  const letters: CaughtLetter[] = []
  for (const name of (await readdir(dir)).filter((each) => /^\d+\.json$/.test(each)).sort()) {
    const parsed = caughtLetter.safeParse(await readJson(join(dir, name)))
    if (parsed.success) letters.push(parsed.data)
  }
  return letters
}

async function readJson(file: string): Promise<unknown> {
  try {
    return JSON.parse(await readFile(file, 'utf8'))
  } catch {
    // A file cut short by a crash holds no letter.
    return null
  }
}
