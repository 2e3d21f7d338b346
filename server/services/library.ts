import { firstDirection } from '../../shared/library'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { LibraryPage, LibraryQuery, LibrarySummary } from '../../shared/schemas/library'
import type { Actor, App } from '../app'
import { countStates, countTags, problemsInOrder, searchLibrary } from '../database/repositories/library'
import { cursorOf, positionOf, readPage } from '../database/repositories/pages'
import { contextOf, itemOf } from './problem-items'

/** A page of the problems that match, sorted in the database. Pages are counted by position: what changes meanwhile may shift them. */
export async function libraryPage(app: App, actor: Actor, query: LibraryQuery): Promise<LibraryPage> {
  const { sort, limit } = query
  const start = positionOf(query.cursor)
  const direction = query.direction ?? firstDirection(sort)
  const place = { sort, direction, limit, offset: start }
  const { ids, total } = await searchLibrary(app.db, actor.workspaceId, query, place)
  const rows = await problemsInOrder(app.db, ids)
  const context = await contextOf(app, ids)
  return {
    items: rows.map((row) => itemOf(row, context)),
    nextCursor: start + limit < total ? cursorOf(start + limit) : null,
    previousCursor: start > 0 ? cursorOf(Math.max(0, start - limit)) : null,
    total,
    start,
  }
}

/** Tags in use, in alphabetical order, with how many problems bear each. */
export const tagsInUse = (
  app: App,
  { workspaceId }: Actor,
  query: PageQuery,
): Promise<Page<LibrarySummary['tags'][number]>> =>
  readPage(
    query,
    ({ limit, offset }) => countTags(app.db, workspaceId).limit(limit).offset(offset),
    (tag) => tag,
  )

/** How many problems have come how far, and the tags in use. */
export async function librarySummary(app: App, actor: Actor): Promise<LibrarySummary> {
  const states = await countStates(app.db, actor.workspaceId)
  const first = { sort: 'changedAt', direction: 'descending', limit: 1, offset: 0 } as const
  const { ids } = await searchLibrary(app.db, actor.workspaceId, { q: '', tag: [] }, first)
  return {
    total: states.reduce((sum, { count }) => sum + count, 0),
    states: Object.fromEntries(states.map(({ state, count }) => [state, count])),
    tags: await countTags(app.db, actor.workspaceId),
    newest: ids[0] ?? null,
  }
}
