import { ApiError } from '../api-error'

/** The id a page starts after (or before); `start` for the first page. */
export function cursorId(cursor: string | undefined, start: number): number {
  if (cursor === undefined) return start
  if (!/^\d{1,15}$/.test(cursor)) throw new ApiError('not-valid', 'The cursor is not one of ours.', { fields: { cursor: 'Not a cursor.' } })
  return Number(cursor)
}

export const fromNewest = Number.MAX_SAFE_INTEGER

/** A page of a list read with one item more than asked for, which tells whether there is another page. */
export function pageOf<T extends { id: number }>(rows: T[], limit: number): { items: T[]; nextCursor: string | null } {
  const items = rows.slice(0, limit)
  const last = items.at(-1)
  return { items, nextCursor: rows.length > limit && last ? String(last.id) : null }
}
