import { sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { grantTime, sweepReservations } from '../../server/services/budget'
import { budgetEntriesOf, budgetFile, budgetTotal, budgetView } from '../../server/services/budget-view'
import { importEmbedding } from '../../server/services/embedding-import'
import { uploadReturn } from '../../server/services/returns'
import { handOver } from '../../server/services/review'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import { asStoredFile } from '../../server/services/stored-files'
import { RESERVATION_DAYS } from '../../shared/budget'
import { grantSchema } from '../../shared/schemas/budget'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { emptyFolder } from '../support/folders'
import { newMember } from '../support/people'
import { startPostgres } from '../support/postgres'

/** 1 × 10 ms to programme and 100 × (20 + 100 + 20) µs to read, by the machine's default figures. */
const RUN_SECONDS = 0.024

interface World {
  test: TestApp
  reviewer: Actor
  machineId: string
  embeddingId: string
  close(): Promise<void>
}

async function makeWorld(databaseUrl?: string): Promise<World> {
  const test = await startTestApp(1, emptyFolder(), undefined, databaseUrl)
  const reviewer = await newMember(test.app, test.actor, 'Rita', ['reviewer'])
  const problemId = await test.problem('a b 1\nb c 1\na c 1\n')
  const machineId = await test.machine({ kind: 'king', width: 3, height: 3 })
  const chains = { a: [0], b: [1], c: [3] }
  const { id: embeddingId } = await importEmbedding(test.app, test.actor, { problemId, machineId, chains })
  return { test, reviewer, machineId, embeddingId, close: () => test.close() }
}

/** A run sheet in review. */
async function inReview({ test, embeddingId }: World): Promise<string> {
  const input = createRunSheetSchema.parse({ embeddingId, reads: 100, annealMicroseconds: 20 })
  const { id } = await createRunSheet(test.app, test.actor, input)
  await handOver(test.app, test.actor, id, 'submit', '')
  return id
}
const approve = ({ test, reviewer }: World, id: string) => handOver(test.app, reviewer, id, 'approve', '')
const grant = ({ test, reviewer }: World, given: Record<string, unknown>) =>
  grantTime(test.app, reviewer, grantSchema.parse(given))
const total = async ({ test, reviewer }: World) => (await budgetTotal(test.app, reviewer.workspaceId))!
const entries = async ({ test, reviewer }: World) => (await budgetEntriesOf(test.app, reviewer, { limit: 200 })).items

function samples({ test }: World, id: string, machineTimeSeconds?: number) {
  const bytes = Buffer.from('0,1,3\n1,-1,1\n-1,1,-1\n')
  const options = uploadReturnSchema.parse({ gauges: 'undone', machineTimeSeconds })
  return asStoredFile('samples.csv', bytes, (stored) => uploadReturn(test.app, test.actor, id, stored, options))
}

let world: World
beforeAll(async () => {
  world = await makeWorld()
})
afterAll(() => world?.close())

it('keeps no budget before the first grant: run sheets are approved freely', async () => {
  const id = await inReview(world)
  await approve(world, id)
  expect(await budgetTotal(world.test.app, world.reviewer.workspaceId)).toBeNull()
  expect((await runSheetView(world.test.app, world.test.actor, id)).budget).toBeNull()
})

describe('from the first grant on', () => {
  it('refuses what the budget does not hold, and holds the estimate of what is approved', async () => {
    await grant(world, { seconds: 0.03, machineId: world.machineId, remark: 'December' })
    const [first, second] = [await inReview(world), await inReview(world)]
    await approve(world, first)
    expect(await total(world)).toMatchObject({ grantedSeconds: 0.03, reservedSeconds: RUN_SECONDS, spentSeconds: 0 })
    await expect(approve(world, second)).rejects.toMatchObject({
      code: 'budget.short',
      message: expect.stringContaining('needs about 24 ms of machine time; 6 ms is left'),
    })
    const view = await runSheetView(world.test.app, world.test.actor, second)
    expect(view.state).toBe('in review')
    expect(view.checks.find(({ about }) => about === 'budget')).toMatchObject({ verdict: 'caution' })
    expect(view.budget).toEqual({ leftSeconds: 0.006, heldSeconds: 0 })
    await grant(world, { seconds: 0.018 })
    await approve(world, second)
    expect(await total(world)).toMatchObject({ availableSeconds: 0, reservedSeconds: 2 * RUN_SECONDS })
  })

  it('enters what a run took when its samples come back, and frees the rest', async () => {
    const { holds } = await budgetView(world.test.app, world.reviewer)
    expect(holds.map(({ seconds }) => seconds)).toEqual([RUN_SECONDS, RUN_SECONDS])
    await samples(world, holds[0]!.runSheet.id, 0.02)
    expect(await total(world)).toMatchObject({
      availableSeconds: 0.004,
      reservedSeconds: RUN_SECONDS,
      spentSeconds: 0.02,
    })
    // Longer than was estimated, from two pools: what was not reserved is charged to the machine's own time.
    await samples(world, holds[1]!.runSheet.id, 0.03)
    expect(await total(world)).toMatchObject({ availableSeconds: -0.002, reservedSeconds: 0, spentSeconds: 0.05 })
    expect((await entries(world)).slice(0, 3).map(({ move, seconds }) => [move, seconds])).toEqual([
      ['charge', 0.006],
      ['settle', 0.018],
      ['settle', 0.006],
    ])
    const { spent } = await budgetView(world.test.app, world.reviewer)
    expect(spent).toEqual([expect.objectContaining({ seconds: 0.05, month: new Date().toISOString().slice(0, 7) })])
  })

  it('enters the estimate where the samples state no machine time, and says so', async () => {
    await grant(world, { seconds: 1 })
    const id = await inReview(world)
    await approve(world, id)
    await samples(world, id)
    expect((await entries(world))[0]).toMatchObject({ move: 'settle', seconds: RUN_SECONDS, remark: /estimate/ })
    // Looked at once more: a run is settled once.
    const before = await total(world)
    await samples(world, id, 5)
    expect(await total(world)).toEqual(before)
  })

  it('frees what was not used in time, and holds it again when the run sheet is issued', async () => {
    const id = await inReview(world)
    await approve(world, id)
    const later = new Date(world.test.app.now().getTime() + (RESERVATION_DAYS + 1) * 86_400_000)
    await sweepReservations({ ...world.test.app, now: () => later })
    expect((await entries(world))[0]).toMatchObject({ move: 'release', by: null, seconds: RUN_SECONDS })
    expect((await total(world)).reservedSeconds).toBe(0)
    await handOver(world.test.app, world.test.actor, id, 'issue', '')
    expect((await total(world)).reservedSeconds).toBe(RUN_SECONDS)
  })

  it('takes back no more than is free', async () => {
    const { pools } = await budgetView(world.test.app, world.reviewer)
    const free = pools.find(({ machine }) => machine === null)!.availableSeconds
    await expect(grant(world, { seconds: -free - 1e-6 })).rejects.toMatchObject({ code: 'budget.taken' })
    await grant(world, { seconds: -free })
    await expect(grant(world, { seconds: -1e-6 })).rejects.toMatchObject({ code: 'budget.taken' })
    await expect(grant(world, { seconds: 1, machineId: 'nowhere' })).rejects.toMatchObject({ code: 'machine.unknown' })
  })

  it('is only ever added to', async () => {
    const { db } = world.test.app
    await expect(db.execute(sql`update budget_entries set microseconds = 1`)).rejects.toThrow()
    await expect(db.execute(sql`delete from budget_entries`)).rejects.toThrow()
    const file = await budgetFile(world.test.app, world.reviewer)
    expect(file.trim().split('\n')).toHaveLength((await entries(world)).length + 1)
  })
})

/** 50 approvals at once against time for 10; then samples of all of them at once. */
async function fiftyAtOnce(make: World): Promise<void> {
  const ids: string[] = []
  for (let k = 0; k < 50; k++) ids.push(await inReview(make))
  await grant(make, { seconds: 4 * RUN_SECONDS, machineId: make.machineId })
  await grant(make, { seconds: 6 * RUN_SECONDS + 0.5 * RUN_SECONDS })
  const outcomes = await Promise.allSettled(ids.map((id) => approve(make, id)))
  const refused = outcomes.flatMap((outcome) => (outcome.status === 'rejected' ? [outcome.reason.code] : []))
  expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(10)
  expect(new Set(refused)).toEqual(new Set(['budget.short']))
  const held = await total(make)
  expect(held.reservedSeconds).toBeCloseTo(10 * RUN_SECONDS, 9)
  expect(held.availableSeconds).toBeCloseTo(0.5 * RUN_SECONDS, 9)
  const approved = ids.filter((_, k) => outcomes[k]!.status === 'fulfilled')
  await Promise.all(approved.map((id, k) => samples(make, id, k % 2 ? 0.02 : 0.025)))
  const { grantedSeconds, availableSeconds, reservedSeconds, spentSeconds } = await total(make)
  expect(reservedSeconds).toBe(0)
  expect(spentSeconds).toBeCloseTo(5 * 0.02 + 5 * 0.025, 9)
  expect(availableSeconds + spentSeconds).toBeCloseTo(grantedSeconds, 9)
}

it('approves exactly ten of fifty at once where there is time for ten, on a PostgreSQL server', async () => {
  const postgres = await startPostgres()
  const make = await makeWorld(postgres.url)
  await fiftyAtOnce(make)
    .finally(() => make.close())
    .finally(() => postgres.stop())
})
