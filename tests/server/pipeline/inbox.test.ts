import { copyFile, mkdir, readdir, symlink, utimes, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { deleteFile } from '../../../server/pipeline/delete-file'
import { presentFile } from '../../../server/pipeline/present-file'
import { scanInbox } from '../../../server/pipeline/scan-inbox'
import { aPerson, cleanSea, seaFile } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let inbox: string
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  inbox = join(context.env.dataDir, 'inbox')
  await mkdir(inbox)
})
afterEach(() => context.close())
afterAll(cleanSea)

const files = async () => (await context.models.files.findAll({ order: [['name', 'ASC']] })).map(({ name, status }) => `${name} ${status}`)
const longAgo = new Date('2020-01-01T00:00:00Z')

async function dropSea(name: string): Promise<void> {
  await copyFile(await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }]), join(inbox, name))
  await utimes(join(inbox, name), longAgo, longAgo)
}

async function dropLarge(name: string): Promise<void> {
  context.env.maxUploadBytes = 1024 * 1024
  await writeFile(join(inbox, name), Buffer.alloc(1024 * 1024 + 1))
  await utimes(join(inbox, name), longAgo, longAgo)
}

describe('the inbox', () => {
  it('passes a file over that is too large, keeps a refused row with the reason, and takes the ones after it', async () => {
    await dropLarge('a-large.nc')
    await dropSea('b-good.nc')
    await scanInbox(context)
    expect(await files()).toEqual(['a-large.nc refused', 'b-good.nc received'])
    expect(await readdir(inbox)).toEqual(['refused'])
    expect(await readdir(join(inbox, 'refused'))).toEqual(['a-large.nc'])
    const large = await context.models.files.findOne({ where: { name: 'a-large.nc' }, rejectOnEmpty: true })
    expect(await presentFile(context, large)).toMatchObject({
      origin: 'inbox', bytes: 1024 * 1024 + 1, refusal: { code: 'too-large', message: 'The file is larger than 1 MB. It was moved to inbox/refused.' },
    })
    await scanInbox(context)
    expect(await files()).toHaveLength(2)
  })

  it('passes over what the system does not let it read', async () => {
    // Its first byte cannot be read by anybody, and it is a file all the same.
    await symlink('/proc/self/mem', join(inbox, 'a-broken.nc'))
    await dropSea('b-good.nc')
    await scanInbox(context)
    await scanInbox(context)
    expect(await files()).toEqual(['a-broken.nc refused', 'b-good.nc received'])
    const broken = await context.models.files.findOne({ where: { name: 'a-broken.nc' }, rejectOnEmpty: true })
    expect(broken.refusal).toMatchObject({ code: 'not-readable', message: 'The system does not let Offing read this file (EIO). It was moved to inbox/refused.' })
    expect(await readdir(join(inbox, 'refused'))).toEqual(['a-broken.nc'])
  })

  it('keeps one that was moved aside before when another of its name follows', async () => {
    await dropLarge('large.nc')
    await scanInbox(context)
    await dropLarge('large.nc')
    await scanInbox(context)
    expect(await readdir(join(inbox, 'refused'))).toHaveLength(2)
    expect(await files()).toEqual(['large.nc refused'])
  })

  it('does not read one again that can be neither taken nor moved', async () => {
    await dropLarge('large.nc')
    // Where the folder should be lies a file.
    await writeFile(join(inbox, 'refused'), 'x')
    await scanInbox(context)
    await context.models.files.destroy({ where: {} })
    await scanInbox(context)
    expect((await files()).filter((one) => one.startsWith('large'))).toEqual([])
    expect(await readdir(inbox)).toContain('large.nc')
  })

  it('leaves a file for the next look when the fault is not its own', async () => {
    await dropSea('sea.nc')
    await mkdir(join(context.env.dataDir, 'files'), { recursive: true })
    await writeFile(join(context.env.dataDir, 'files', 'arriving'), 'in the way')
    await expect(scanInbox(context)).rejects.toThrow()
    expect(await files()).toEqual([])
    expect(await readdir(inbox)).toEqual(['sea.nc'])
  })

  it('lets an admin put the row of a file away whose bytes were not kept', async () => {
    await dropLarge('large.nc')
    await scanInbox(context)
    const large = await context.models.files.findOne({ where: { name: 'large.nc' }, rejectOnEmpty: true })
    const admin = await aPerson(context)
    await deleteFile(context, admin, large.id)
    expect(await files()).toEqual([])
  })
})
