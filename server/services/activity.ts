import { groupDigits } from '../../shared/engine/digits'
import type { ActivityItem, ActivityView } from '../../shared/schemas/activity'
import type { PageQuery, Person } from '../../shared/schemas/common'
import type { Actor, App } from '../app'
import type { ActivityFacts, ActivityRow, ActivityScope } from '../database/repositories/activity/told'
import { listActivity } from '../database/repositories/activity/list'
import { pageOf, positionOf } from '../database/repositories/pages'
import { personsOf } from '../database/repositories/people'
import { problemRow } from './problems'
import { runSheetRow } from './run-sheets'
import { signed, signOf } from './sense'

type Words = Pick<ActivityItem, 'what' | 'detail'>

const HANDED_OVER: Readonly<Record<string, string>> = {
  'submitted for review': 'submitted',
  remark: 'wrote a remark on',
  'back in review': 'put a repaired embedding under, which is back in review:',
  'on a repaired embedding': 'put a repaired embedding under',
}

const counted = (count: number, one: string): string => `${groupDigits(count)} ${one}${count === 1 ? '' : 's'}`
const joined = (...parts: (string | null | undefined | false)[]): string | null =>
  parts.filter(Boolean).join(', ') || null

function optimumText({ status, energy, isProved, isMax, reason }: ActivityFacts['optimum']): string | null {
  if (status === 'running') return 'being looked for'
  if (energy === null) return joined(status, reason)
  return `${signed(signOf(isMax ? 'max' : 'min'), energy)}, ${isProved ? 'proved' : 'not proved'}`
}

function embeddingText({ machine, status, inPlaceOf, longest, qubits }: ActivityFacts['embedding']): string | null {
  const found =
    longest !== null && qubits !== null && `longest chain ${groupDigits(longest)}, ${counted(qubits, 'qubit')}`
  const ending = { running: 'being looked for', found: null }[status] ?? status
  return joined(`on ${machine}`, inPlaceOf && `in place of ${inPlaceOf}`, found || ending)
}

function versionWords({ version, remark, isRelabelled, isMade }: ActivityFacts['version']): Words {
  if (version === 1) return { what: isMade ? 'made' : 'uploaded', detail: remark || null }
  const what = isRelabelled ? 'renamed variables of' : 'uploaded a version of'
  return { what, detail: joined(`version ${version}`, remark) }
}

function samplesWords({ source, byBridge, status, reads, broken }: ActivityFacts['samples']): Words {
  const loaded = byBridge ? 'returned samples' : 'loaded samples'
  const figures = joined(counted(reads, 'read'), broken !== null && `${groupDigits(broken)} with a break`)
  const detail = status === 'ready' ? figures : status
  return { what: source === 'rehearsal' ? 'rehearsed' : loaded, detail }
}

const WORDS: { [K in keyof ActivityFacts]: (facts: ActivityFacts[K]) => Words } = {
  version: versionWords,
  optimum: (facts) => ({ what: 'looked for the reference optimum of', detail: optimumText(facts) }),
  embedding: (facts) => ({ what: facts.isImported ? 'imported' : 'looked for', detail: embeddingText(facts) }),
  broken: ({ machine, calibration, chains, ofChains }) => ({
    what: `calibrated ${machine}, which breaks`,
    detail: `calibration ${calibration}, ${groupDigits(chains)} of ${counted(ofChains, 'chain')}`,
  }),
  'run sheet': ({ name, from }) => ({ what: 'prepared', detail: joined(name, from && `from ${from}`) }),
  remark: ({ what }) => ({ what: HANDED_OVER[what] ?? what, detail: null }),
  samples: samplesWords,
  scan: ({ number, strengths }) => ({
    what: 'scanned strengths of',
    detail: `scan ${number}, ${counted(strengths, 'strength')} measured`,
  }),
  answer: ({ isRevoked }) => ({
    what: isRevoked ? 'took back the answer link of' : 'made an answer link of',
    detail: null,
  }),
  deed: ({ what }) => ({ what, detail: null }),
}

const wordsOf = <K extends keyof ActivityFacts>(source: K, facts: ActivityFacts[K]): Words => WORDS[source](facts)

function itemOf(row: ActivityRow, people: ReadonlyMap<string, Person>): ActivityItem {
  const { id, at, by, forUserId, token, source, kind, thingId, label, isGone, facts } = row
  const isBridge = source === 'samples' && facts.byBridge
  return {
    ...{ id, at: at.toISOString() },
    by: isBridge || by === null ? null : (people.get(by) ?? null),
    for: forUserId === null ? null : (people.get(forUserId) ?? null),
    ...{ token, ...wordsOf(source, facts) },
    kind,
    thing: { id: thingId, label, isGone },
  }
}

async function activityIn(app: App, scope: ActivityScope, { limit, cursor }: PageQuery): Promise<ActivityView> {
  const offset = positionOf(cursor)
  const rows = await listActivity(app.db, scope, { limit: limit + 1, offset })
  const ids = rows.flatMap(({ by, forUserId }) => [by, forUserId]).filter((id) => id !== null)
  const people = new Map((await personsOf(app.db, [...new Set(ids)])).map((person) => [person.id, person]))
  return pageOf(
    rows.map((row) => itemOf(row, people)),
    limit,
    offset,
  )
}

/** What happened to a problem, its embeddings, run sheets and samples, newest first. @throws DomainError not found */
export async function activityOfProblem(app: App, actor: Actor, id: string, page: PageQuery): Promise<ActivityView> {
  await problemRow(app, actor, id)
  return activityIn(app, { workspaceId: actor.workspaceId, problemId: id }, page)
}

/** What happened to a run sheet, its samples, and what was made from it, newest first. @throws DomainError not found */
export async function activityOfRunSheet(app: App, actor: Actor, id: string, page: PageQuery): Promise<ActivityView> {
  await runSheetRow(app, actor, id)
  return activityIn(app, { workspaceId: actor.workspaceId, runSheetId: id }, page)
}
