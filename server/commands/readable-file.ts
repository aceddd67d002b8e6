import { access, constants, stat } from 'node:fs/promises'
import { BadUsage } from './bad-usage'

/** Says clearly what is wrong with a path before anything is done with any of them. */
export async function checkReadable(path: string): Promise<void> {
  const found = await stat(path).catch(() => null)
  if (!found) throw new BadUsage(`There is no file ${path}.`)
  if (!found.isFile()) throw new BadUsage(`${path} is no file.`)
  await access(path, constants.R_OK).catch(() => {
    throw new BadUsage(`${path} may not be read by this user.`)
  })
}
