import { DomainError } from '../../../shared/errors'
import type { Page, PageQuery } from '../../../shared/schemas/common'

/** Cursors are the running position in a list ordered newest first, made opaque. */
export const cursorOf = (position: number): string => Buffer.from(String(position)).toString('base64url')

/** For a cursor that no answer gave out. */
export const noSuchCursor = (): DomainError =>
  new DomainError(
    'not acceptable',
    'list.cursor',
    'The cursor is not one that this list gave. Take nextCursor of the answer before, or leave it out for the first page.',
    [{ path: 'cursor', message: 'take nextCursor of the answer before' }],
  )

/**
 * The position that a cursor stands for; 0 without one.
 * @throws DomainError not acceptable for one that is none of ours
 */
export function positionOf(cursor: string | undefined): number {
  if (!cursor) return 0
  const position = Number(Buffer.from(cursor, 'base64url').toString())
  if (!Number.isSafeInteger(position) || position < 0 || cursorOf(position) !== cursor) throw noSuchCursor()
  return position
}

/** Makes a page from `limit + 1` rows fetched. */
export function pageOf<T>(rows: T[], limit: number, position: number): Page<T> {
  const more = rows.length > limit
  return { items: rows.slice(0, limit), nextCursor: more ? cursorOf(position + limit) : null }
}

/** Rows of an ordered list. */
export interface Place {
  limit: number
  offset: number
}

/** A page of a list as it is shown; one row more than it holds is fetched, which tells whether there is another page. */
export async function readPage<Row, Item>(
  { limit, cursor }: PageQuery,
  fetchRows: (place: Place) => PromiseLike<Row[]>,
  viewOf: (row: Row) => Item,
): Promise<Page<Item>> {
  const offset = positionOf(cursor)
  return pageOf((await fetchRows({ limit: limit + 1, offset })).map(viewOf), limit, offset)
}
