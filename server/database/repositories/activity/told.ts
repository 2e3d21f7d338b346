import type { AnyColumn, SQL } from 'drizzle-orm'
import { eq, sql } from 'drizzle-orm'
import type { AuditKind } from '../../../../shared/audit'
import { auditEntries, embeddings, returns, runSheets } from '../../schema'

/** What each record tells beside who did it, to what and when. */
export interface ActivityFacts {
  version: { version: number; remark: string; isRelabelled: boolean; isMade: boolean }
  optimum: { status: string; energy: number | null; isProved: boolean; isMax: boolean; reason: string | null }
  embedding: {
    machine: string
    status: string
    isImported: boolean
    inPlaceOf: string | null
    longest: number | null
    qubits: number | null
  }
  broken: { machine: string; calibration: number; chains: number; ofChains: number }
  'run sheet': { name: string; from: string | null }
  remark: { what: string }
  samples: { source: string; byBridge: boolean; status: string; reads: number; broken: number | null }
  scan: { number: number; strengths: number }
  answer: { isRevoked: boolean }
  deed: { what: string }
}
type Source = keyof ActivityFacts

/** What happened, as its record tells it. */
export type ActivityRow = {
  [K in Source]: {
    id: string
    at: Date
    by: string | null
    /** The reviewer in whose place it was decided. */
    forUserId: string | null
    token: string | null
    source: K
    kind: AuditKind
    thingId: string
    /** `RS-3/1`. */
    label: string
    /** It is deleted, though that can still be undone. */
    isGone: boolean
    facts: ActivityFacts[K]
  }
}[Source]

/** Everything about a problem, or about one run sheet of it. */
export type ActivityScope = { workspaceId: string } & ({ problemId: string } | { runSheetId: string })

type Value = SQL | AnyColumn
interface Told {
  id: Value
  at: Value
  by: Value
  source: Source
  kind: Value | AuditKind
  thingId: Value
  label: Value
  facts: Value
  isGone?: Value
  forUserId?: Value
  token?: Value
}

const NOTHING = sql`null::text`
export const isDeleted = (column: AnyColumn): SQL => sql`${column} is not null`

/** One shape for all, as a union needs it. */
export const told = ({ id, at, by, source, kind, thingId, label, facts, ...rest }: Told) => ({
  id: sql<string>`${id}`.as('id'),
  at: sql<Date>`${at}`.mapWith(auditEntries.at).as('at'),
  by: sql<string | null>`${by}`.as('by'),
  forUserId: sql<string | null>`${rest.forUserId ?? NOTHING}`.as('for_user_id'),
  token: sql<string | null>`${rest.token ?? NOTHING}`.as('token'),
  source: sql<Source>`${sql.raw(`'${source}'`)}::text`.as('source'),
  kind: sql<AuditKind>`${typeof kind === 'string' ? sql.raw(`'${kind}'`) : kind}::text`.as('kind'),
  thingId: sql<string>`${thingId}`.as('thing_id'),
  label: sql<string>`${label}`.as('label'),
  isGone: sql<boolean>`${rest.isGone ?? sql`false`}`.as('is_gone'),
  facts: sql<never>`${facts}`.as('facts'),
})

export const sheetLabel = sql`'RS-' || ${runSheets.number}`
export const samplesLabel = sql`'RS-' || ${runSheets.number} || '/' || ${returns.number}`

/** Which run sheets, joined to their embeddings. */
export const sheetsIn = (scope: ActivityScope): SQL =>
  'problemId' in scope ? eq(embeddings.problemId, scope.problemId) : eq(runSheets.id, scope.runSheetId)
