import type { SQL } from 'drizzle-orm'
import { and, asc, count, desc, eq, inArray, isNull, sql } from 'drizzle-orm'
import type { Direction, LibraryField, ProblemState } from '../../../shared/library'
import { tagKey } from '../../../shared/library'
import type { LibraryQuery } from '../../../shared/schemas/library'
import type { Db } from '../client'
import { embeddings, machines, problems, problemVersions, returns, runSheets } from '../schema'
import type { ProblemRow } from './problems'
import { problemsAtCurrentVersion } from './problems'

const ofCurrentVersion = eq(embeddings.problemVersion, problems.currentVersion)

/*
 * What stands beside a problem is looked up for each by itself, step by step through the indices. Joined freely, it takes
 * a plan that rests on statistics; the embedded database gathers none by itself, and then needs quadratic time.
 */

/** The embedding that stands for a problem: of the current version, chosen, found, newest, in this order. */
const shownEmbedding = (db: Db) =>
  db
    .select({
      number: embeddings.number,
      status: embeddings.status,
      isCurrent: sql<boolean>`${ofCurrentVersion}`.as('embedding_is_current'),
      machine: machines.name,
      longest: sql<number | null>`(${embeddings.stats}->'chainLength'->>'max')::float8`.as('longest'),
    })
    .from(embeddings)
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .where(and(eq(embeddings.problemId, problems.id), isNull(embeddings.deletedWith)))
    .orderBy(
      desc(ofCurrentVersion),
      desc(embeddings.chosen),
      desc(eq(embeddings.status, 'found')),
      desc(embeddings.createdAt),
      desc(embeddings.number),
    )
    .limit(1)
    .as('shown')

/** The run sheet that stands for a problem: of the current version, then the newest. */
function shownSheet(db: Db) {
  const newest = db
    .select({ number: runSheets.number, state: runSheets.state, createdAt: runSheets.createdAt })
    .from(runSheets)
    .where(and(eq(runSheets.embeddingId, embeddings.id), isNull(runSheets.deletedWith)))
    .orderBy(desc(runSheets.createdAt), desc(runSheets.number))
    .limit(1)
    .as('newest')
  return db
    .select({
      sheet: sql<number>`${newest.number}`.as('sheet'),
      state: newest.state,
      isCurrent: sql<boolean>`${ofCurrentVersion}`.as('sheet_is_current'),
    })
    .from(embeddings)
    .crossJoinLateral(newest)
    .where(eq(embeddings.problemId, problems.id))
    .orderBy(desc(ofCurrentVersion), desc(newest.createdAt), desc(newest.number))
    .limit(1)
    .as('sheets')
}

/** Least and greatest energy of the samples for a problem's current version. */
function sampled(db: Db) {
  const ofSheet = db
    .select({ low: sql`min(${returns.best})`.as('low'), high: sql`max(${returns.best})`.as('high') })
    .from(returns)
    .where(and(eq(returns.runSheetId, runSheets.id), isNull(returns.deletedWith)))
    .as('of_sheet')
  const ofEmbedding = db
    .select({ low: sql`min(${ofSheet.low})`.as('lowest'), high: sql`max(${ofSheet.high})`.as('highest') })
    .from(runSheets)
    .crossJoinLateral(ofSheet)
    .where(eq(runSheets.embeddingId, embeddings.id))
    .as('of_embedding')
  return db
    .select({
      least: sql<number | null>`min(${ofEmbedding.low})`.as('least'),
      greatest: sql<number | null>`max(${ofEmbedding.high})`.as('greatest'),
    })
    .from(embeddings)
    .crossJoinLateral(ofEmbedding)
    .where(and(eq(embeddings.problemId, problems.id), ofCurrentVersion))
    .as('sampled')
}

type Beside = 'shown' | 'sheets' | 'energies'

/** What the library is sought and sorted by. */
function partsOf(db: Db) {
  const [shown, sheets, energies] = [shownEmbedding(db), shownSheet(db), sampled(db)]
  const state = sql<ProblemState>`case
    when ${sheets.isCurrent} then ${sheets.state}
    when ${shown.status} is null then 'not embedded'
    when ${shown.status} = 'found' then case when ${shown.isCurrent} then 'embedded' else 'to carry over' end
    when ${shown.status} = 'running' then 'searching'
    else 'none found' end`
  /** Problems at their current versions, with what is needed beside them: how many there are, or the state of each. */
  const select = (needed: readonly Beside[], told: 'total' | 'state') => {
    const beside = { shown, sheets, energies }
    const query = db
      .select({
        id: problems.id,
        state: (told === 'state' ? state : sql<ProblemState>`null::text`).as('problem_state'),
        total: (told === 'total' ? sql<number>`count(*) over ()` : sql<number>`0`).mapWith(Number).as('total'),
      })
      .from(problems)
      .innerJoin(
        problemVersions,
        and(eq(problemVersions.problemId, problems.id), eq(problemVersions.version, problems.currentVersion)),
      )
      .$dynamic()
    for (const name of new Set(needed)) query.leftJoinLateral(beside[name], sql`true`)
    return query
  }
  return { shown, sheets, energies, state, select }
}

type Parts = ReturnType<typeof partsOf>

/** Texts by code point, whatever the server's language: pages and scripts rely on the order. */
const byCodePoint = (text: unknown): SQL => sql`lower(${text}) collate "C"`

/** What the order by a field rests on. */
const NEEDED: Partial<Record<LibraryField, Beside>> = {
  machine: 'shown',
  embedding: 'shown',
  longest: 'shown',
  runSheet: 'sheets',
  best: 'energies',
}

function keyOf({ shown, sheets, energies }: Parts, field: LibraryField): SQL {
  const keys: Record<LibraryField, SQL> = {
    number: sql`${problems.number}`,
    name: byCodePoint(problems.name),
    form: byCodePoint(problemVersions.form),
    variables: sql`${problemVersions.variables}`,
    interactions: sql`${problemVersions.interactions}`,
    density: sql`(${problemVersions.structure}->>'density')::float8`,
    machine: byCodePoint(shown.machine),
    embedding: sql`${shown.number}`,
    longest: sql`${shown.longest}`,
    runSheet: byCodePoint(sheets.state),
    best: sql`case when ${problemVersions.sense} = 'max' then ${energies.greatest} else ${energies.least} end`,
    changedAt: sql`${problems.changedAt}`,
  }
  return keys[field]
}

const bearsTag = (tag: string): SQL =>
  sql`exists (select 1 from jsonb_array_elements_text(${problems.tags}) as borne where lower(borne) = lower(${tagKey(tag)}))`

/** All that a word may occur in. */
const wordsOf = ({ shown, sheets }: Parts): SQL => sql`lower(concat_ws(' ',
  'P-' || ${problems.number}, ${problems.name}, ${problemVersions.form},
  'E-' || ${shown.number} || ' ' || ${shown.machine},
  'RS-' || ${sheets.sheet} || ' ' || ${sheets.state},
  (select string_agg(borne, ' ') from jsonb_array_elements_text(${problems.tags}) as borne)))`

type Filter = Pick<LibraryQuery, 'q' | 'tag' | 'form' | 'state'>

function conditionOf(parts: Parts, workspaceId: string, { q, tag, form, state }: Filter): SQL | undefined {
  const words = q.split(/\s+/).filter(Boolean)
  return and(
    eq(problems.workspaceId, workspaceId),
    isNull(problems.deletedWith),
    form && eq(problemVersions.form, form),
    state && eq(parts.state, state),
    ...tag.map(bearsTag),
    ...words.map((word) => sql`strpos(${wordsOf(parts)}, lower(${word})) > 0`),
  )
}

/** What the conditions rest on. */
const neededFor = ({ q, state }: Filter): Beside[] => (q !== '' || state ? ['shown', 'sheets'] : [])

interface Place {
  sort: LibraryField
  direction: Direction
  limit: number
  offset: number
}

/**
 * Ids of the problems that match, sorted; those without a value stand last either way, equals by number. With how many
 * match in all.
 */
export async function searchLibrary(
  db: Db,
  workspaceId: string,
  filter: Filter,
  { sort, direction, limit, offset }: Place,
): Promise<{ ids: string[]; total: number }> {
  const parts = partsOf(db)
  const condition = conditionOf(parts, workspaceId, filter)
  const key = keyOf(parts, sort)
  const needed = neededFor(filter)
  const beside = NEEDED[sort]
  const rows = await parts
    .select(beside ? [...needed, beside] : needed, 'total')
    .where(condition)
    .orderBy(direction === 'ascending' ? sql`${key} asc nulls last` : sql`${key} desc nulls last`, asc(problems.number))
    .limit(limit)
    .offset(offset)
  return {
    ids: rows.map(({ id }) => id),
    total: rows[0]?.total ?? (await countBefore(parts, needed, condition, offset)),
  }
}

/** How many match, where the page asked for lies behind all of them. */
async function countBefore(parts: Parts, needed: readonly Beside[], condition: SQL | undefined, offset: number) {
  if (offset === 0) return 0
  return (await parts.select(needed, 'total').where(condition).limit(1))[0]?.total ?? 0
}

/** Problems at their current versions, in the order of the ids given. */
export async function problemsInOrder(db: Db, ids: readonly string[]): Promise<ProblemRow[]> {
  if (ids.length === 0) return []
  const rows = await problemsAtCurrentVersion(db).where(inArray(problems.id, [...ids]))
  const places = new Map(rows.map((row) => [row.id, row]))
  return ids.flatMap((id) => places.get(id) ?? [])
}

/** How many problems have come to each state. */
export async function countStates(db: Db, workspaceId: string): Promise<{ state: ProblemState; count: number }[]> {
  const parts = partsOf(db)
  const all = parts
    .select(['shown', 'sheets'], 'state')
    .where(conditionOf(parts, workspaceId, { q: '', tag: [] }))
    .as('all_problems')
  return db.select({ state: all.state, count: count() }).from(all).groupBy(all.state)
}

/** Tags in use, and how many problems bear each. */
export function countTags(db: Db, workspaceId: string) {
  const borne = sql<string>`jsonb_array_elements_text(${problems.tags})`
  const each = db
    .select({ tag: borne.as('tag') })
    .from(problems)
    .where(and(eq(problems.workspaceId, workspaceId), isNull(problems.deletedWith)))
    .as('each')
  const spelt = sql<string>`min(${each.tag} collate "C")`
  return db
    .select({ tag: spelt, count: count() })
    .from(each)
    .groupBy(sql`lower(${each.tag})`)
    .orderBy(sql`lower(min(${each.tag} collate "C")) collate "C"`)
}
