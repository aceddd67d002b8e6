import { createHash } from 'node:crypto'
import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { uploadFields } from '../../shared/schemas/files'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { arrivedFiles, upload } from '../middleware/upload'
import { deleteFile } from '../pipeline/delete-file'
import { createFeedsOfFile, presentFeeds } from '../pipeline/feeds'
import { filePicture, fileTile, fileTileKey } from '../pipeline/file-picture'
import { presentFile, presentFiles } from '../pipeline/present-file'
import { receiveFile } from '../pipeline/receive-file'
import { dropFile } from '../pipeline/stored-files'
import { emptyTile } from '../pictures/empty-tile'
import { rowsBefore } from '../queries/rows-after'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'
import { tilePlace } from './tile-place'

export function fileRoutes(router: Router, context: Context): void {
  serve(
    router,
    context,
    endpoints.uploadFiles,
    async ({ person, req }) => {
      const files = arrivedFiles(req)
      const fields = uploadFields.safeParse(blanksLeftOut(req.body))
      if (!fields.success || files.length === 0) {
        await Promise.all(files.map((file) => dropFile(file.arrived)))
        if (files.length === 0) throw new ApiError('bad-request', 'No file came with the request. Files are sent in the field "file".')
        throw new ApiError('not-valid', 'feedId is a number and observedAt an instant such as 2026-06-11T12:40:00Z.')
      }
      const feedId = fields.data.feedId ?? null
      if (feedId !== null && !(await context.models.feeds.findByPk(feedId))) {
        await Promise.all(files.map((file) => dropFile(file.arrived)))
        throw new ApiError('not-valid', 'There is no such feed.', { fields: { feedId: 'There is no such feed.' } })
      }
      const observedAt = fields.data.observedAt === undefined ? null : Date.parse(fields.data.observedAt)
      const items = []
      for (const { name, arrived } of files) {
        const file = await receiveFile(context, { name, arrived, origin: 'upload', userId: person.id, feedId, observedAt })
        items.push({ id: file.id, name: file.name, checksum: file.checksum, status: file.status })
      }
      context.wake()
      return { items }
    },
    { before: [upload(context)] },
  )
  serve(router, context, endpoints.listFiles, async ({ query: { limit, cursor, status } }) => {
    const { items, nextCursor } = pageOf(await rowsBefore(context.models.files, cursorId(cursor, fromNewest), limit + 1, status ? { status } : {}), limit)
    return { items: await presentFiles(context, items), nextCursor }
  })
  serve(router, context, endpoints.file, async ({ params }) => {
    const file = await context.models.files.findByPk(params.id)
    if (!file) throw new ApiError('not-found', 'There is no such file.')
    return presentFile(context, file)
  })
  serve(router, context, endpoints.confirmFeeds, async ({ person, params, body }) => ({
    items: await presentFeeds(context, await createFeedsOfFile(context, person, params.id, body.feeds)),
    nextCursor: null,
  }))
  serve(router, context, endpoints.fileTile, async ({ params, query: { theme, variable, hidden }, req, res }) => {
    const tile = { ...tilePlace(params), theme }
    const picture = await filePicture(context, params.id, { variable, hidden })
    const tag = `"${createHash('sha1').update(fileTileKey(picture, tile)).digest('base64url')}"`
    res.set({ ETag: tag, 'Cache-Control': 'private, max-age=60' })
    if (req.get('If-None-Match') === tag) {
      res.status(304).end()
      return
    }
    const drawn = await fileTile(context, picture, tile)
    res.type('png').end(drawn === null ? emptyTile : Buffer.from(drawn))
  })
  serve(router, context, endpoints.deleteFile, ({ person, params }) => deleteFile(context, person, params.id))
}

function blanksLeftOut(body: unknown): Record<string, unknown> {
  return Object.fromEntries(Object.entries((body ?? {}) as Record<string, unknown>).filter(([, value]) => value !== ''))
}
