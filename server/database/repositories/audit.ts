import { and, asc, desc, eq, gte, lt } from 'drizzle-orm'
import type { AuditKind } from '../../../shared/audit'
import type { Db } from '../client'
import { standInLabel } from './stand-ins'
import {
  auditEntries,
  embeddings,
  invitations,
  machines,
  problems,
  returns,
  runSheets,
  tokens,
  users,
  workspaces,
} from '../schema'

export async function insertAuditEntry(db: Db, row: typeof auditEntries.$inferInsert): Promise<void> {
  await db.insert(auditEntries).values(row)
}

/** Which entries: half-open in time. */
export interface AuditScope {
  workspaceId: string
  by?: string
  kind?: AuditKind
  from?: Date
  before?: Date
}

/** Newest first, with who did it. */
export async function listAuditEntries(db: Db, scope: AuditScope, page: { limit: number; offset: number }) {
  return db
    .select({ entry: auditEntries, by: { id: users.id, name: users.name } })
    .from(auditEntries)
    .innerJoin(users, eq(users.id, auditEntries.by))
    .where(
      and(
        eq(auditEntries.workspaceId, scope.workspaceId),
        scope.by ? eq(auditEntries.by, scope.by) : undefined,
        scope.kind ? eq(auditEntries.kind, scope.kind) : undefined,
        scope.from ? gte(auditEntries.at, scope.from) : undefined,
        scope.before ? lt(auditEntries.at, scope.before) : undefined,
      ),
    )
    .orderBy(desc(auditEntries.at), desc(auditEntries.id))
    .limit(page.limit)
    .offset(page.offset)
}

/** Everybody who did something in the workspace, by name. */
export async function listAuditPeople(db: Db, workspaceId: string) {
  return db
    .selectDistinct({ id: users.id, name: users.name })
    .from(auditEntries)
    .innerJoin(users, eq(users.id, auditEntries.by))
    .where(eq(auditEntries.workspaceId, workspaceId))
    .orderBy(asc(users.name))
}

export async function findTokenName(db: Db, id: string): Promise<string | undefined> {
  return (await db.select({ name: tokens.name }).from(tokens).where(eq(tokens.id, id)))[0]?.name
}

const numbered = (letters: string, rows: readonly { number: number; name?: string | null }[]): string | undefined =>
  rows[0] && `${letters}-${rows[0].number}${rows[0].name ? ` ${rows[0].name}` : ''}`

/** How each kind of thing is called. */
const LABELS: Record<AuditKind, (db: Db, id: string) => Promise<string | undefined>> = {
  problem: async (db, id) => numbered('P', await db.select().from(problems).where(eq(problems.id, id))),
  embedding: async (db, id) =>
    numbered(
      'E',
      await db
        .select({ number: embeddings.number, name: problems.name })
        .from(embeddings)
        .innerJoin(problems, eq(problems.id, embeddings.problemId))
        .where(eq(embeddings.id, id)),
    ),
  'run sheet': async (db, id) => numbered('RS', await db.select().from(runSheets).where(eq(runSheets.id, id))),
  samples: async (db, id) => {
    const rows = await db
      .select({ number: runSheets.number, set: returns.number })
      .from(returns)
      .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
      .where(eq(returns.id, id))
    return rows[0] && `RS-${rows[0].number}/${rows[0].set}`
  },
  machine: async (db, id) => (await db.select().from(machines).where(eq(machines.id, id)))[0]?.name,
  budget: async () => undefined,
  person: async (db, id) => (await db.select().from(users).where(eq(users.id, id)))[0]?.name,
  invitation: async (db, id) => (await db.select().from(invitations).where(eq(invitations.id, id)))[0]?.email,
  token: findTokenName,
  'sign-in': async () => undefined,
  'stand-in': standInLabel,
  workspace: async (db, id) => (await db.select().from(workspaces).where(eq(workspaces.id, id)))[0]?.name,
}

/** What a thing is called now; undefined where it has no name or is gone. */
export const labelOfThing = (db: Db, kind: AuditKind, id: string): Promise<string | undefined> => LABELS[kind](db, id)

const onEmbedding = (db: Db) =>
  db
    .select({ problem: embeddings.problemId, embedding: embeddings.id, sheet: runSheets.id })
    .from(embeddings)
    .leftJoin(runSheets, eq(runSheets.embeddingId, embeddings.id))
    .$dynamic()

/** What a thing stands on: its problem, embedding and run sheet, as far as it has them. */
export async function carriersOfThing(db: Db, kind: AuditKind, id: string): Promise<string[]> {
  if (kind === 'embedding')
    return (await onEmbedding(db).where(eq(embeddings.id, id)).limit(1)).map(({ problem }) => problem)
  if (kind === 'run sheet')
    return (await onEmbedding(db).where(eq(runSheets.id, id))).flatMap(({ problem, embedding }) => [problem, embedding])
  if (kind !== 'samples') return []
  const rows = await onEmbedding(db).innerJoin(returns, eq(returns.runSheetId, runSheets.id)).where(eq(returns.id, id))
  return rows.flatMap(({ problem, embedding, sheet }) => [problem, embedding, ...(sheet ? [sheet] : [])])
}
