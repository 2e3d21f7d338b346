import { DomainError } from '../../shared/errors'
import { NEWS_KEPT_DAYS } from '../../shared/schemas/news'
import type { NewsItem, NewsQuery, NewsView, UnreadNews } from '../../shared/schemas/news'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { NewsPlace, NewsRow, ThingFolder } from '../database/repositories/news'
import { countUnread, deleteOldNews, listNews, markAllRead, markRead, thingsThere } from '../database/repositories/news'
import { noSuchCursor } from '../database/repositories/pages'

const DAY_MS = 24 * 60 * 60 * 1000

/** Cursors name the last item shown, so that what comes or is read meanwhile neither repeats nor skips any. */
const cursorOf = ({ createdAt, id }: NewsRow): string =>
  Buffer.from(`${createdAt.getTime()} ${id}`).toString('base64url')

/** The place that a cursor stands for; none without one. */
function placeOf(cursor: string | undefined): NewsPlace | undefined {
  if (!cursor) return undefined
  const [, time, id] = /^(\d{1,15}) ([\w-]{1,64})$/.exec(Buffer.from(cursor, 'base64url').toString()) ?? []
  if (!time || !id) throw noSuchCursor()
  return { at: new Date(Number(time)), id }
}

interface Thing {
  folder: ThingFolder
  id: string
}

/** The thing whose page it is; undefined where the page is of none. */
function thingAt(path: string): Thing | undefined {
  const [, folder, id] =
    /^\/(problems|machines|embeddings|run-sheets|returns)\/([\w-]{8,64})(?:[/#]|$)/.exec(path) ?? []
  return folder && id ? { folder: folder as ThingFolder, id } : undefined
}

/** Paths of those rows whose things were deleted since. */
async function goneOf(db: Db, rows: readonly NewsRow[]): Promise<Set<string>> {
  const named = rows.flatMap(({ path }) => {
    const thing = thingAt(path)
    return thing ? [{ path, ...thing }] : []
  })
  const gone = new Set<string>()
  for (const folder of new Set(named.map((one) => one.folder))) {
    const ofFolder = named.filter((one) => one.folder === folder)
    const there = await thingsThere(
      db,
      folder,
      ofFolder.map(({ id }) => id),
    )
    for (const { path, id } of ofFolder) if (!there.includes(id)) gone.add(path)
  }
  return gone
}

const itemOf = ({ id, kind, title, text, quote, path, createdAt, readAt }: NewsRow, isGone: boolean): NewsItem => ({
  ...{ id, kind, title, text, quote, path, isGone },
  at: createdAt.toISOString(),
  readAt: readAt?.toISOString() ?? null,
})

/** Rows as they are shown. */
export async function itemsOf(db: Db, rows: readonly NewsRow[]): Promise<NewsItem[]> {
  const gone = await goneOf(db, rows)
  return rows.map((row) => itemOf(row, gone.has(row.path)))
}

/** What somebody is told in the workspace, newest first. */
export async function newsOf(app: App, actor: Actor, { unread = false, limit, cursor }: NewsQuery): Promise<NewsView> {
  const rows = await listNews(app.db, actor, { unread, limit: limit + 1, after: placeOf(cursor) })
  const shown = rows.slice(0, limit)
  return {
    items: await itemsOf(app.db, shown),
    nextCursor: rows.length > limit ? cursorOf(shown.at(-1)!) : null,
    ...(await unreadNews(app, actor)),
  }
}

export const unreadNews = async (app: App, actor: Actor): Promise<UnreadNews> => ({
  unread: await countUnread(app.db, actor),
})

/** Marks an item as read. @throws DomainError not found, for one of somebody else or of another workspace */
export async function readNews(app: App, actor: Actor, id: string): Promise<UnreadNews> {
  if (!(await markRead(app.db, actor, id, app.now())))
    throw new DomainError('not found', 'news.missing', 'There is no such news here; it may be too old to be kept.')
  return unreadNews(app, actor)
}

/** Marks all as read, or all that was written until a moment: what came after it was seen by nobody. */
export async function readAllNews(app: App, actor: Actor, upTo?: string): Promise<UnreadNews> {
  const now = app.now()
  await markAllRead(app.db, actor, upTo ? new Date(upTo) : now, now)
  return unreadNews(app, actor)
}

/** Deletes what has been kept for long enough. */
export async function sweepNews(app: App): Promise<void> {
  const now = app.now().getTime()
  await deleteOldNews(app.db, {
    readBefore: new Date(now - NEWS_KEPT_DAYS.read * DAY_MS),
    before: new Date(now - NEWS_KEPT_DAYS.unread * DAY_MS),
  })
}
