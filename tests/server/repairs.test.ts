import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { CalibrationReview } from '../../server/services/broken-embeddings'
import { brokenList } from '../../server/services/broken-view'
import { importEmbedding } from '../../server/services/embedding-import'
import { embeddingView } from '../../server/services/embedding-view'
import { chooseEmbedding, startEmbedding } from '../../server/services/embeddings'
import { calibratedMachine } from '../../server/services/machine-graphs'
import { calibrateMachine, machineView } from '../../server/services/machines'
import { outboxOf } from '../../server/services/mail'
import { Overtaken } from '../../server/services/overtaken'
import { startRepairs } from '../../server/services/repairs'
import { handOver } from '../../server/services/review'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import type { TaskName } from '../../server/workers/tasks'
import { createRandom } from '../../shared/engine/random'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import type { EmbeddingView } from '../../shared/schemas/embeddings'
import { outboxQuerySchema } from '../../shared/schemas/mail'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import { unpackArrays } from '../../shared/packed-arrays'
import { unpackChainRows } from '../../utils/run-sheet/chains'
import { packedChains } from '../../server/services/run-sheet-chains'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { newMember } from '../support/people'

let test: TestApp
let steward: Actor
let reviewer: Actor
beforeAll(async () => {
  test = await startTestApp(2)
  steward = await newMember(test.app, test.actor, 'Steward', ['steward'])
  reviewer = await newMember(test.app, test.actor, 'Reviewer', ['reviewer'])
})
afterAll(() => test.close())

const lose = (machineId: string, qubits: number[], couplers: [number, number][] = []) =>
  calibrateMachine(test.app, steward, machineId, { defects: { qubits, couplers }, remark: 'swapped a cable' })
const viewOf = (id: string) => embeddingView(test.app, test.actor, id)
const listOf = (machineId: string) => brokenList(test.app, test.actor, machineId, { limit: 50 })

async function repaired(machineId: string, embeddingIds?: string[]): Promise<EmbeddingView[]> {
  const { repairs } = await startRepairs(test.app, test.actor, machineId, { embeddingIds })
  const views: EmbeddingView[] = []
  for (const { id, jobId } of repairs) {
    await test.finished(jobId)
    views.push(await viewOf(id))
  }
  return views
}

/** A triangle on a 3 × 3 lattice of cells: the chain of c joins qubits 3 and 4. */
async function triangle(kind: 'square' | 'king' = 'square', c = [3, 4]) {
  const problemId = await test.problem('a b 1\nb c 1\na c 1\n')
  const machineId = await test.machine({ kind, width: 3, height: 3 })
  const chains = { a: [0], b: [1], c }
  const { id } = await importEmbedding(test.app, test.actor, { problemId, machineId, chains })
  return { problemId, machineId, id, chains }
}

describe('a calibration that takes away twenty used qubits', () => {
  const VARIABLES = 60

  /** Sixty variables, each with about three interactions. */
  const sparse = (seed: number): string => {
    const random = createRandom(seed)
    return Array.from({ length: 90 }, () => {
      const i = random.below(VARIABLES)
      return `v${i} v${(i + 1 + random.below(VARIABLES - 1)) % VARIABLES} 1`
    })
      .concat(Array.from({ length: VARIABLES }, (_, i) => `v${i} v${i} 1`))
      .join('\n')
  }

  it('breaks exactly the embeddings that use one of them; each is repaired with four chains in five untouched', async () => {
    const { app, actor } = test
    const machineId = await test.machine({ kind: 'pegasus', m: 6 })
    const views: EmbeddingView[] = []
    for (let seed = 1; seed <= 5; seed++) {
      const problemId = await test.problem(sparse(seed))
      const asked = createEmbeddingSchema.parse({
        problemId,
        machineId,
        method: 'search',
        tries: 1,
        timeLimitSeconds: 60,
        seed,
      })
      const { id, jobId } = await startEmbedding(app, actor, asked)
      await test.finished(jobId)
      views.push(await viewOf(id))
    }
    expect(views.map(({ status }) => status)).toEqual(new Array(5).fill('found'))
    const usedBy = (view: EmbeddingView): Set<number> => new Set(Object.values(view.chains).flat())
    const spared = new Set([...usedBy(views[3]!), ...usedBy(views[4]!)])
    const candidates = [...new Set(views.slice(0, 3).flatMap((view) => [...usedBy(view)]))].filter(
      (q) => !spared.has(q),
    )
    const random = createRandom(20)
    const lost = new Set<number>()
    while (lost.size < 20) lost.add(candidates[random.below(candidates.length)]!)

    const concerned = views.filter((view) => [...usedBy(view)].some((q) => lost.has(q)))
    const { invalidated } = await lose(machineId, [...lost])
    expect(concerned.length).toBeGreaterThan(1)
    expect(invalidated.embeddings.map(({ id }) => id).sort()).toEqual(concerned.map(({ id }) => id).sort())
    for (const view of views) expect((await viewOf(view.id)).holdsAtCurrentCalibration).toBe(!concerned.includes(view))
    for (const { embedding, damage } of (await listOf(machineId)).items) {
      const view = views.find(({ id }) => id === embedding.id)!
      const qubits = [...usedBy(view)].filter((q) => lost.has(q)).sort((a, b) => a - b)
      const chains = Object.values(view.chains).filter((chain) => chain.some((q) => lost.has(q))).length
      expect(damage).toEqual({ chains, ofChains: VARIABLES, qubitsLost: qubits, couplersLost: [] })
    }

    const after = await repaired(machineId)
    expect(after).toHaveLength(concerned.length)
    for (const view of after) {
      const before = views.find(({ id }) => id === view.start!.id)!
      const changed = Object.keys(view.chains).filter(
        (label) => String(view.chains[label]) !== String(before.chains[label]),
      )
      expect(view).toMatchObject({ status: 'found', calibration: 2, holdsAtCurrentCalibration: true, broken: null })
      expect(view.start).toMatchObject({
        changed: changed.length,
        changedChains: changed,
        replaces: true,
        before: { longestChain: before.stats!.chainLength.max, qubitsUsed: before.stats!.qubitsUsed },
      })
      expect(changed.length).toBeLessThanOrEqual(0.2 * VARIABLES)
      expect([...usedBy(view)].filter((q) => lost.has(q))).toEqual([])
    }
    expect((await listOf(machineId)).items.map(({ state }) => state)).toEqual(concerned.map(() => 'repaired'))
  })
})

describe('run sheets on a broken embedding', () => {
  const sheetOn = (embeddingId: string, name: string) =>
    createRunSheet(
      test.app,
      test.actor,
      createRunSheetSchema.parse({ embeddingId, name, strength: { rule: 'manual', value: 2, perChain: { c: 3 } } }),
    )
  const hand = (id: string, step: 'submit' | 'approve' | 'sendBack' | 'issue', remark = '') =>
    handOver(test.app, step === 'approve' || step === 'sendBack' ? reviewer : test.actor, id, step, remark)

  async function through(embeddingId: string, name: string, ...steps: Parameters<typeof hand>[1][]): Promise<string> {
    const { id } = await sheetOn(embeddingId, name)
    for (const step of steps) await hand(id, step, 'as agreed')
    return id
  }

  it('move to the repaired one unless they were issued, and what was agreed to is reviewed again', async () => {
    const { app, actor } = test
    const { machineId, id: embeddingId } = await triangle()
    await chooseEmbedding(app, actor, embeddingId, true)
    const draft = await through(embeddingId, 'Draft')
    const back = await through(embeddingId, 'Back', 'submit', 'sendBack')
    const waiting = await through(embeddingId, 'Waiting', 'submit')
    const agreed = await through(embeddingId, 'Agreed', 'submit', 'approve')
    const issued = await through(embeddingId, 'Issued', 'submit', 'approve', 'issue')
    const { invalidated } = await lose(machineId, [4])
    expect(invalidated.runSheets.map(({ id }) => id).sort()).toEqual([draft, back, waiting, agreed, issued].sort())
    const broken = await runSheetView(app, actor, agreed)
    expect(broken.broken).toMatchObject({ state: 'to repair', damage: { chains: 1, ofChains: 3, qubitsLost: [4] } })
    expect(broken.checks).toContainEqual({
      verdict: 'refused',
      what: 'Calibration 2 broke the embedding: 1 qubit of it missing',
      figure: '1 of 3 chains damaged',
      about: 'embedding',
      at: '#origin',
    })
    await expect(hand(waiting, 'approve')).rejects.toMatchObject({ code: 'run-sheet.checks' })

    const [after] = await repaired(machineId, [embeddingId])
    expect(after).toMatchObject({ status: 'found', chosen: true, start: { changed: 1, changedChains: ['c'] } })
    expect((await viewOf(embeddingId)).chosen).toBe(false)
    const now = async (id: string) => {
      const { embedding, state, reviewedBy, broken, remarks } = await runSheetView(app, actor, id)
      return {
        embedding: embedding.id,
        state,
        reviewedBy: reviewedBy?.name ?? null,
        broken: broken?.state ?? null,
        said: remarks.at(-1)!,
      }
    }
    const moved = `moved from E-1 to E-2, repaired for calibration 2: 1 of 3 chains changed`
    const said = (what: string) => expect.objectContaining({ what, text: moved })
    const there = { embedding: after!.id, broken: null, reviewedBy: null }
    expect(await now(draft)).toEqual({ ...there, state: 'draft', said: said('on a repaired embedding') })
    expect(await now(back)).toEqual({
      ...there,
      state: 'sent back',
      reviewedBy: 'Reviewer',
      said: said('on a repaired embedding'),
    })
    expect(await now(waiting)).toEqual({ ...there, state: 'in review', said: said('on a repaired embedding') })
    expect(await now(agreed)).toEqual({ ...there, state: 'in review', said: said('back in review') })
    expect(await now(issued)).toMatchObject({ embedding: embeddingId, state: 'issued', broken: 'repaired' })
    // The strength of single chains means the same chains as before, and the sheet can be agreed to again.
    const { settings } = await runSheetView(app, actor, agreed)
    expect(settings.strength.perChain).toEqual({ c: 3 })
    const chains = unpackChainRows(unpackArrays(await packedChains(app, actor, agreed)))
    expect(chains.map(({ strength }) => strength)).toEqual([2, 2, 3])
    expect(await hand(agreed, 'approve')).toEqual({ state: 'approved', for: null })
  })

  it('stay where they are when there is no repair', async () => {
    const { machineId, id: embeddingId } = await triangle()
    const draft = await through(embeddingId, 'Draft')
    // What is left of the machine is a path: no triangle fits on it.
    await lose(machineId, [3, 4, 5, 6, 7, 8])
    const refused = startRepairs(test.app, test.actor, machineId, {})
    await expect(refused).rejects.toMatchObject({
      kind: 'not acceptable',
      code: 'repair.refused',
      issues: [{ path: 'E-1' }],
    })
    expect((await runSheetView(test.app, test.actor, draft)).embedding.id).toBe(embeddingId)
    expect((await listOf(machineId)).items).toMatchObject([
      { state: 'to repair', runSheets: [{ id: draft, state: 'draft' }] },
    ])
  })

  it('are told of to those concerned, once for each calibration', async () => {
    const { app, actor } = test
    const first = await triangle()
    const second = await importEmbedding(app, actor, { ...first, chains: { a: [0], b: [1], c: [3, 4] } })
    await through(first.id, 'Ferries Bcc: all@works.example.org', 'submit', 'approve')
    const since = new Set(
      (await outboxOf(app, actor, outboxQuerySchema.parse({ limit: 200 }))).items.map(({ id }) => id),
    )
    await lose(first.machineId, [4])
    await repaired(first.machineId, [first.id])
    const { items } = await outboxOf(app, actor, outboxQuerySchema.parse({ limit: 200 }))
    const fresh = items.filter(({ id }) => !since.has(id)).reverse()
    expect(fresh.map(({ to, subject }) => `${to.name}: ${subject}`)).toEqual([
      expect.stringMatching(/^Developer: Calibration 2 of Machine .* broke 2 embeddings$/),
      // Asked for by the developer, who prepared the run sheet: the reviewer alone is told.
      expect.stringMatching(/^Reviewer: RS-\d+ is back in review: Ferries Bcc: all@works\.example\.org$/),
    ])
    const [broke, moved] = fresh
    for (const id of [first.id, second.id]) expect(broke!.text).toContain(`http://localhost:3000/embeddings/${id}\n`)
    expect(broke!.text).toContain('1 of 3 chains damaged; missing: 1 qubit')
    expect(broke!.text).toContain('> swapped a cable')
    expect(broke!.text).toMatch(/You get this because you made the embedding/)
    expect(moved!.text).toContain('1 of 3 chains changed')
    expect(new Set(fresh.map(({ state }) => state))).toEqual(new Set(['kept']))
  })
})

describe('a broken embedding', () => {
  it('holds again when a later calibration brings back what it lacked', async () => {
    const { machineId, id } = await triangle()
    await lose(machineId, [4, 8])
    await lose(machineId, [1, 4])
    expect((await listOf(machineId)).items).toMatchObject([
      { calibration: 2, calibrationInForce: 3, damage: { chains: 2, qubitsLost: [1, 4] }, state: 'to repair' },
    ])
    const { invalidated } = await lose(machineId, [8])
    expect(invalidated.embeddings).toEqual([])
    expect((await listOf(machineId)).items).toMatchObject([{ embedding: { id }, state: 'holds again', holdsAgain: 4 }])
    expect(await viewOf(id)).toMatchObject({ holdsAtCurrentCalibration: true, broken: null })
    await expect(startRepairs(test.app, test.actor, machineId, { embeddingIds: [id] })).rejects.toMatchObject({
      kind: 'wrong state',
      code: 'repair.holds',
    })
    await expect(startRepairs(test.app, test.actor, machineId, {})).rejects.toMatchObject({ code: 'repair.none' })
    // Broken once more, it is listed once more; the earlier time stays with its calibration.
    await lose(machineId, [0])
    expect((await listOf(machineId)).items.map(({ calibration, state }) => [calibration, state])).toEqual([
      [5, 'to repair'],
    ])
    const { calibrations } = await machineView(test.app, test.actor, machineId)
    expect(calibrations.map(({ broke }) => broke.length)).toEqual([1, 0, 0, 1, 0])
  })

  it('is one that lost a coupler it uses, even where its chains stand; repair then changes none', async () => {
    const { machineId, id, chains } = await triangle('king', [3, 4, 6])
    await lose(machineId, [], [[3, 6]])
    expect((await listOf(machineId)).items).toMatchObject([
      { embedding: { id }, damage: { chains: 0, ofChains: 3, qubitsLost: [], couplersLost: [[3, 6]] } },
    ])
    const [after] = await repaired(machineId)
    expect(after).toMatchObject({ status: 'found', chains, start: { changed: 0, changedChains: [] } })
  })

  it('is repaired once, whoever asks and how often', async () => {
    const { machineId, id } = await triangle()
    await lose(machineId, [4])
    const asked = await Promise.allSettled(
      [test.actor, steward].map((actor) => startRepairs(test.app, actor, machineId, { embeddingIds: [id] })),
    )
    const started = asked.flatMap((one) => (one.status === 'fulfilled' ? one.value.repairs : []))
    expect(new Set(started.map((one) => one.id)).size).toBe(1)
    await test.finished(started[0]!.jobId)
    await expect(startRepairs(test.app, test.actor, machineId, { embeddingIds: [id] })).rejects.toMatchObject({
      kind: 'wrong state',
      code: 'repair.done',
    })
    const other = await triangle()
    await expect(startRepairs(test.app, test.actor, other.machineId, { embeddingIds: [id] })).rejects.toMatchObject({
      code: 'repair.machine',
    })
    await expect(
      startRepairs(test.app, { ...test.actor, workspaceId: 'elsewhere' }, machineId, {}),
    ).rejects.toMatchObject({ kind: 'not found' })
  })

  it('is found as one where a newer calibration was saved while it was made', async () => {
    const { problemId, machineId, id: first, chains } = await triangle()
    await lose(machineId, [4])
    const asked = createEmbeddingSchema.parse({
      problemId,
      machineId,
      calibration: 1,
      start: { embeddingId: first, work: 'shorten' },
    })
    const { id, jobId } = await startEmbedding(test.app, test.actor, asked)
    await test.finished(jobId)
    const imported = await importEmbedding(test.app, test.actor, { problemId, machineId, calibration: 1, chains })
    for (const made of [id, imported.id])
      expect(await viewOf(made)).toMatchObject({
        status: 'found',
        calibration: 1,
        broken: { calibration: 2, damage: { chains: 1, qubitsLost: [4] }, state: 'to repair' },
      })
    expect((await listOf(machineId)).items).toHaveLength(3)
  })
})

describe('a calibration and an embedding at the same time', () => {
  it('judge an embedding that is found while the calibration is worked out', async () => {
    const { app, actor } = test
    const { problemId, machineId, chains } = await triangle()
    const { graph, usable, fabric } = await calibratedMachine(app, actor, machineId)
    const review = new CalibrationReview(app, machineId, { graph, usable }, fabric.ids)
    await review.judgeAll()
    await importEmbedding(app, actor, { problemId, machineId, chains })
    await expect(app.db.transaction((tx) => review.store(tx, 1))).rejects.toBeInstanceOf(Overtaken)
    await review.judgeAll()
    expect(await app.db.transaction((tx) => review.store(tx, 1))).toEqual([])
  })

  it('judge it by the calibration that is saved just before it is', async () => {
    const { app, actor } = test
    const { problemId, machineId, chains } = await triangle()
    await lose(machineId, [8])
    const { run } = app.compute
    let looks = 0
    const compute = {
      ...app.compute,
      run: async (name: TaskName, input: never) => {
        const answer = await run(name, input)
        if (name === 'findDamage' && looks++ === 0) await lose(machineId, [4, 8])
        return answer
      },
    }
    const { id } = await importEmbedding({ ...app, compute: compute as never }, actor, {
      problemId,
      machineId,
      calibration: 1,
      chains,
    })
    expect(looks).toBe(2)
    expect(await viewOf(id)).toMatchObject({ broken: { calibration: 3, damage: { qubitsLost: [4] } } })
  })
})
