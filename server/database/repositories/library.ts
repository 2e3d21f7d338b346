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

/** Of every problem the embedding that stands for it: of the current version, chosen, found, newest, in this order. */
const shownEmbeddings = (db: Db, workspaceId: string) =>
  db
    .selectDistinctOn([embeddings.problemId], {
      problemId: embeddings.problemId,
      number: embeddings.number,
      status: embeddings.status,
      isCurrent: sql<boolean>`${ofCurrentVersion}`.as('embedding_is_current'),
      machine: machines.name,
      longest: sql<number | null>`(${embeddings.stats}->'chainLength'->>'max')::float8`.as('longest'),
    })
    .from(embeddings)
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .where(and(eq(embeddings.workspaceId, workspaceId), isNull(embeddings.deletedWith)))
    .orderBy(
      embeddings.problemId,
      desc(ofCurrentVersion),
      desc(embeddings.chosen),
      desc(eq(embeddings.status, 'found')),
      desc(embeddings.createdAt),
      desc(embeddings.number),
    )
    .as('shown')

/** Of every problem the run sheet that stands for it: of the current version, then the newest. */
const shownSheets = (db: Db, workspaceId: string) =>
  db
    .selectDistinctOn([embeddings.problemId], {
      problemId: embeddings.problemId,
      sheet: sql<number>`${runSheets.number}`.as('sheet'),
      state: runSheets.state,
      isCurrent: sql<boolean>`${ofCurrentVersion}`.as('sheet_is_current'),
    })
    .from(runSheets)
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .where(and(eq(runSheets.workspaceId, workspaceId), isNull(runSheets.deletedWith)))
    .orderBy(embeddings.problemId, desc(ofCurrentVersion), desc(runSheets.createdAt), desc(runSheets.number))
    .as('sheets')

/** Least and greatest energy of the samples for every problem's current version. */
const sampled = (db: Db, workspaceId: string) =>
  db
    .select({
      problemId: embeddings.problemId,
      least: sql<number | null>`min(${returns.best})`.as('least'),
      greatest: sql<number | null>`max(${returns.best})`.as('greatest'),
    })
    .from(returns)
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .innerJoin(problems, and(eq(problems.id, embeddings.problemId), ofCurrentVersion))
    .where(and(eq(returns.workspaceId, workspaceId), isNull(returns.deletedWith)))
    .groupBy(embeddings.problemId)
    .as('sampled')

/** What a library is sought and sorted by. Joins that a query does not use are left out by the database. */
function partsOf(db: Db, workspaceId: string) {
  const shown = shownEmbeddings(db, workspaceId)
  const sheets = shownSheets(db, workspaceId)
  const energies = sampled(db, workspaceId)
  const state = sql<ProblemState>`case
    when ${sheets.isCurrent} then ${sheets.state}
    when ${shown.status} is null then 'not embedded'
    when ${shown.status} = 'found' then case when ${shown.isCurrent} then 'embedded' else 'to carry over' end
    when ${shown.status} = 'running' then 'searching'
    else 'none found' end`
  const select = () =>
    db
      .select({ id: problems.id, state: state.as('problem_state') })
      .from(problems)
      .innerJoin(
        problemVersions,
        and(eq(problemVersions.problemId, problems.id), eq(problemVersions.version, problems.currentVersion)),
      )
      .leftJoin(shown, eq(shown.problemId, problems.id))
      .leftJoin(sheets, eq(sheets.problemId, problems.id))
      .leftJoin(energies, eq(energies.problemId, problems.id))
  return { shown, sheets, energies, state, select }
}

type Parts = ReturnType<typeof partsOf>

/** Texts by code point, whatever the server's language: pages and scripts rely on the order. */
const byCodePoint = (text: unknown): SQL => sql`lower(${text}) collate "C"`

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
  const parts = partsOf(db, workspaceId)
  const condition = conditionOf(parts, workspaceId, filter)
  const key = keyOf(parts, sort)
  const rows = await parts
    .select()
    .where(condition)
    .orderBy(direction === 'ascending' ? sql`${key} asc nulls last` : sql`${key} desc nulls last`, asc(problems.number))
    .limit(limit)
    .offset(offset)
  const matching = parts.select().where(condition).as('matching')
  const [counted] = await db.select({ total: count() }).from(matching)
  return { ids: rows.map(({ id }) => id), total: counted!.total }
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
  const parts = partsOf(db, workspaceId)
  const all = parts
    .select()
    .where(conditionOf(parts, workspaceId, { q: '', tag: [] }))
    .as('all_problems')
  return db.select({ state: all.state, count: count() }).from(all).groupBy(all.state)
}

/** Tags in use, and how many problems bear each. */
export async function countTags(db: Db, workspaceId: string): Promise<{ tag: string; count: number }[]> {
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
