import { randomUUID } from 'node:crypto'
import type { Deed } from '../../shared/audit'
import { csvCell, csvWords } from '../../shared/csv'
import type { AuditEntryView, AuditQuery, AuditView } from '../../shared/schemas/audit'
import type { Actor, App } from '../app'
import type { AuditScope } from '../database/repositories/audit'
import {
  carriersOfThing,
  findTokenName,
  insertAuditEntry,
  labelOfThing,
  listAuditEntries,
  listAuditPeople,
} from '../database/repositories/audit'
import { pageOf, positionOf } from '../database/repositories/pages'

const DAY_MS = 86_400_000
const MOST_ROWS = 100_000

/** What a thing is called and what it stands on. */
interface Known {
  name: string | undefined
  within: string[]
}

/** Asked before the thing may be gone, or once it is there. */
export async function knownOfThing(app: App, { kind }: Deed, id: string | null): Promise<Known> {
  if (id === null) return { name: undefined, within: [] }
  return { name: await labelOfThing(app.db, kind, id), within: await carriersOfThing(app.db, kind, id) }
}

interface Done {
  deed: Deed
  thingId: string | null
  /** What was known of it before, where it may be gone. */
  known: Known | undefined
  tokenId: string | null
  address: string
}

/** Writes down what somebody did. */
export async function record(app: App, { userId, workspaceId }: Actor, done: Done): Promise<void> {
  const { deed, thingId, tokenId, address } = done
  const { name, within } = done.known ?? (await knownOfThing(app, deed, thingId))
  await insertAuditEntry(app.db, {
    id: randomUUID(),
    workspaceId,
    at: app.now(),
    by: userId,
    token: tokenId === null ? null : ((await findTokenName(app.db, tokenId)) ?? null),
    address,
    what: deed.what,
    kind: deed.kind,
    thingId,
    thing: name ?? '',
    within,
  })
}

function scopeOf({ workspaceId }: Actor, { by, kind, from, to }: AuditQuery): AuditScope {
  return {
    ...{ workspaceId, by, kind },
    from: from ? new Date(from) : undefined,
    before: to ? new Date(Date.parse(to) + DAY_MS) : undefined,
  }
}

/** Who did what in the workspace, newest first. */
export async function auditTrail(app: App, actor: Actor, query: AuditQuery): Promise<AuditView> {
  const offset = positionOf(query.cursor)
  const rows = await listAuditEntries(app.db, scopeOf(actor, query), { limit: query.limit + 1, offset })
  const people = await listAuditPeople(app.db, actor.workspaceId)
  return { ...pageOf(rows.map(entryView), query.limit, offset), people }
}

const entryView = ({ entry, by }: Awaited<ReturnType<typeof listAuditEntries>>[number]): AuditEntryView => ({
  id: entry.id,
  at: entry.at.toISOString(),
  by,
  token: entry.token,
  address: entry.address,
  what: entry.what,
  kind: entry.kind,
  thing: { id: entry.thingId, label: entry.thing },
})

function line({ at, by, token, address, what, kind, thing }: AuditEntryView): string {
  const who = [csvWords(by.name), by.id, csvWords(token ?? ''), csvCell(address)]
  return `${[at, ...who, csvCell(what), kind, csvWords(thing.label), thing.id ?? ''].join(',')}\n`
}

/** The same as CSV, without pages. */
export async function auditFile(app: App, actor: Actor, query: AuditQuery): Promise<string> {
  const { items } = await auditTrail(app, actor, { ...query, limit: MOST_ROWS, cursor: undefined })
  return `at,by,by id,token,address,what,kind,thing,thing id\n${items.map(line).join('')}`
}
