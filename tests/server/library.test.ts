import { rmSync } from 'node:fs'
import fc from 'fast-check'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { App } from '../../server/app'
import type { Database } from '../../server/database/client'
import { migrate, openDatabase } from '../../server/database/client'
import { createBlobStore } from '../../server/database/repositories/blobs'
import { insertMembership, insertUser, insertWorkspace } from '../../server/database/repositories/people'
import { problems } from '../../server/database/schema'
import { libraryPage, librarySummary } from '../../server/services/library'
import { editProblem, removeProblem } from '../../server/services/problems'
import type { LibraryQuery } from '../../shared/schemas/library'
import { libraryQuerySchema } from '../../shared/schemas/library'
import { LIBRARY_FIELDS, PROBLEM_STATES } from '../../shared/library'
import type { ProblemItem } from '../../shared/schemas/problems'
import { seedLibrary } from '../support/library'
import { emptyFolder } from '../support/folders'
import { matches, sorted } from './library-oracle'

const PROBLEMS = 150

const folder = emptyFolder()
const actor = { userId: 'u', workspaceId: 'w' }
let database: Database
let app: App

const ask = (given: Record<string, unknown> = {}) => libraryPage(app, actor, libraryQuerySchema.parse(given))

/** Every problem, page by page in the order given. */
async function all(given: Record<string, unknown>): Promise<ProblemItem[]> {
  const items: ProblemItem[] = []
  for (let cursor: string | undefined; ;) {
    const page = await ask({ ...given, ...(cursor ? { cursor } : {}) })
    expect(page.start).toBe(items.length)
    items.push(...page.items)
    if (!page.nextCursor) return items
    cursor = page.nextCursor
  }
}

beforeAll(async () => {
  database = await openDatabase({ dataFolder: folder })
  await migrate(database)
  const { db } = database
  const now = () => new Date('2026-12-01T09:00:00Z')
  app = { database, db, blobs: createBlobStore(database, now), now, version: '0', demo: false } as unknown as App
  await insertUser(db, { id: 'u', name: 'U', email: 'u@example.org', passwordHash: '-', createdAt: now() })
  for (const id of ['w', 'elsewhere']) {
    await insertWorkspace(db, { id, name: id, createdAt: now() })
    await insertMembership(db, { userId: 'u', workspaceId: id, roles: ['owner'], createdAt: now() })
    await seedLibrary(app, { userId: 'u', workspaceId: id }, { problems: id === 'w' ? PROBLEMS : 5, seed: 1 })
  }
})
afterAll(async () => {
  await database.close()
  rmSync(folder, { recursive: true })
})

/** Words that occur in some problems, in many, and in none, with characters that a pattern would take for its own. */
const words = fc
  .array(
    fc.constantFrom(
      'berth',
      'P-1',
      'p-14',
      'QUBO',
      'alder',
      'e-2',
      'RS-',
      'returned',
      'winter',
      'ÄRGER',
      '%',
      '_',
      'zzz',
    ),
    {
      maxLength: 2,
    },
  )
  .map((list) => list.join(' '))

const queries: fc.Arbitrary<Partial<LibraryQuery>> = fc.record(
  {
    q: words,
    tag: fc.subarray(['winter', 'Deck', 'crew plan'], { maxLength: 2 }),
    form: fc.constantFrom('qubo' as const, 'ising' as const),
    state: fc.constantFrom(...PROBLEM_STATES),
    sort: fc.constantFrom(...LIBRARY_FIELDS),
    direction: fc.constantFrom('ascending' as const, 'descending' as const),
  },
  { requiredKeys: [] },
)

describe('the library', () => {
  it('answers what a search through everything in memory would', async () => {
    const everything = await all({ limit: 200 })
    expect(everything).toHaveLength(PROBLEMS)
    expect(new Set(everything.map(({ state }) => state)).size).toBeGreaterThan(6)
    let found = 0
    await fc.assert(
      fc.asyncProperty(queries, fc.integer({ min: 1, max: 60 }), async (query, limit) => {
        const expected = sorted(
          everything.filter((item) => matches(item, query)),
          query,
        )
        const page = await ask({ ...query, limit })
        expect(page.total).toBe(expected.length)
        expect(page.items).toEqual(expected.slice(0, limit))
        found += expected.length > 0 ? 1 : 0
      }),
      { numRuns: 150, seed: 7 },
    )
    expect(found).toBeGreaterThan(40)
  })

  it.each(LIBRARY_FIELDS)(
    'gives every problem once over the pages sorted by %s, those without a value last',
    async (sort) => {
      const everything = await all({ limit: 200 })
      for (const direction of ['ascending', 'descending'] as const) {
        const expected = sorted(everything, { sort, direction })
        expect((await all({ sort, direction, limit: 70 })).map(({ id }) => id)).toEqual(expected.map(({ id }) => id))
      }
    },
  )

  it('leads back through the pages', async () => {
    const second = await ask({ limit: 20, cursor: (await ask({ limit: 20 })).nextCursor! })
    expect(second.start).toBe(20)
    const first = await ask({ limit: 20, cursor: second.previousCursor! })
    expect(first).toMatchObject({ start: 0, previousCursor: null })
  })

  it('refuses a cursor that is none, and takes one beyond the end for an empty page', async () => {
    await expect(ask({ cursor: 'garbage' })).rejects.toMatchObject({ code: 'list.cursor' })
    const beyond = await ask({ cursor: Buffer.from('100000').toString('base64url') })
    expect(beyond).toMatchObject({ items: [], total: PROBLEMS, nextCursor: null })
  })

  it('sums up states and tags of the workspace alone', async () => {
    const everything = await all({ limit: 200 })
    const { total, states, tags, newest } = await librarySummary(app, actor)
    expect(newest).toBe((await ask({ limit: 1 })).items[0]!.id)
    expect(total).toBe(PROBLEMS)
    for (const state of PROBLEM_STATES)
      expect(states[state] ?? 0, state).toBe(everything.filter((item) => item.state === state).length)
    for (const { tag, count } of tags)
      expect(count, tag).toBe(everything.filter((item) => item.tags.includes(tag)).length)
    expect(tags.map(({ tag }) => tag)).toEqual([...new Set(everything.flatMap((item) => item.tags))].sort(byKey))
  })

  it('leaves out what is deleted', async () => {
    const [{ id }] = (await ask({ limit: 1, sort: 'number' })).items as [ProblemItem]
    await removeProblem(app, actor, id)
    expect((await ask({ sort: 'number' })).items.map((item) => item.id)).not.toContain(id)
    expect((await librarySummary(app, actor)).total).toBe(PROBLEMS - 1)
    await app.db.update(problems).set({ deletedAt: null, deletedWith: null }).where(eq(problems.id, id))
  })
})

const byKey = (a: string, b: string): number => (a.toLowerCase() < b.toLowerCase() ? -1 : 1)

describe('tags', () => {
  const tagsOf = async (id: string) => (await all({ limit: 200 })).find((item) => item.id === id)!.tags
  const change = (id: string, tags: { add?: string[]; remove?: string[] }) =>
    editProblem(app, actor, id, { tags: { add: [], remove: [], ...tags } })
  let id: string
  beforeAll(async () => {
    id = (await ask({ sort: 'number', limit: 1 })).items[0]!.id
    await change(id, { remove: await tagsOf(id) })
  })

  it('are added once, whatever their case, as the workspace spells them', async () => {
    const before = (await ask({ sort: 'number', limit: 1 })).items[0]!.changedAt
    await change(id, { add: ['WINTER', 'Slow Ferry', 'slow ferry'] })
    expect(await tagsOf(id)).toEqual(['winter', 'Slow Ferry'])
    await change(id, { add: ['Winter'], remove: ['SLOW FERRY'] })
    expect(await tagsOf(id)).toEqual(['winter'])
    // Filing is no change of the problem.
    expect((await ask({ sort: 'number', limit: 1 })).items[0]!.changedAt).toBe(before)
  })

  it('of two people at once are all kept', async () => {
    await Promise.all(['one', 'two', 'three', 'four'].map((tag) => change(id, { add: [tag] })))
    expect((await tagsOf(id)).sort()).toEqual(['four', 'one', 'three', 'two', 'winter'])
  })

  it('are at most twenty', async () => {
    const many = Array.from({ length: 20 }, (_, k) => `tag ${k}`)
    await expect(change(id, { add: many })).rejects.toMatchObject({ code: 'problem.tags' })
    expect(await tagsOf(id)).toHaveLength(5)
  })
})
