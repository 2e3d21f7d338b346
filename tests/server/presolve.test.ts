import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { findProblem } from '../../server/database/repositories/problems'
import { deleteForGood, hide } from '../../server/database/repositories/deletions'
import { insertReduction } from '../../server/database/repositories/reductions'
import { startEmbedding } from '../../server/services/embeddings'
import { liftStates } from '../../server/services/lifting'
import { presolveFile, presolveState, presolveView } from '../../server/services/presolve'
import { energiesOf, problemData } from '../../server/services/problems'
import { uploadProblem } from '../../server/services/problem-upload'
import { coefficientsOf, packRecord } from '../../server/services/reduction-record'
import { startRehearsal } from '../../server/services/rehearsals'
import { inOriginal, solutionsCsv, solutionsOf } from '../../server/services/return-solutions'
import { answerView } from '../../server/services/answer-view'
import { putGroups } from '../../server/services/problem-groups'
import { returnView } from '../../server/services/return-view'
import { saveGroupsSchema } from '../../shared/schemas/groups'
import { createRunSheet } from '../../server/services/run-sheets'
import { reductionLinks, saveReduced } from '../../server/services/reductions'
import { packSteps, TABLES } from '../../shared/engine/problem/presolve/record'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import { uploadProblemSchema } from '../../shared/schemas/problems'
import { createRandom } from '../../shared/engine/random'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(2)
})
afterAll(() => test.close())

async function upload(text: string, options: Record<string, string> = {}): Promise<string> {
  const file = { name: 'problem.txt', bytes: Buffer.from(text) }
  const { id } = await uploadProblem(
    test.app,
    test.actor,
    file,
    uploadProblemSchema.parse({ name: 'Berths', ...options }),
  )
  return id!
}

const rowOf = async (id: string) => (await findProblem(test.app.db, test.actor.workspaceId, id))!

/** Hard cores of 24 variables that no rule takes apart, with leaves, chains and settled variables around them. */
function mixedProblem(seed: number): string {
  const random = createRandom(seed)
  const lines: string[] = []
  for (let i = 0; i < 24; i++)
    for (let j = 0; j < i; j++) if (random.below(2) === 0) lines.push(`core${i} core${j} ${random.below(2) * 2 - 1}`)
  for (let k = 0; k < 5; k++) {
    lines.push(`leaf${k} leaf${k} ${random.below(3) - 1}.5`, `leaf${k} core${k} ${2 * random.below(2) - 1}`)
    lines.push(`fold${k} core${k} 1`, `fold${k} core${k + 9} -1`, `sure${k} sure${k} 4`, `sure${k} core${k} 1`)
  }
  return lines.join('\n')
}

/** The least energy of many seeded descents, each along its steepest way. */
async function leastByDescent(id: string, starts: number): Promise<{ energy: number; state: number[] }> {
  const { app, actor } = test
  const row = (await findProblem(app.db, actor.workspaceId, id))!
  const { problem } = await problemData(app, row)
  const random = createRandom(99)
  const states = Array.from({ length: starts }, () => {
    const state = Array.from({ length: problem.n }, () => 2 * random.below(2) - 1)
    for (let moved = true; moved;) {
      moved = false
      const fields = Array.from(problem.linear)
      problem.values.forEach((value, k) => {
        fields[problem.rows[k]!]! += value * state[problem.cols[k]!]!
        fields[problem.cols[k]!]! += value * state[problem.rows[k]!]!
      })
      const best = fields.reduce((b, f, i) => (f * state[i]! > fields[b]! * state[b]! ? i : b), 0)
      if (fields[best]! * state[best]! > 0) {
        state[best] = -state[best]!
        moved = true
      }
    }
    return state
  })
  const energies = await energiesOf(app, actor, id, { form: 'ising', states })
  const at = energies.indexOf(Math.min(...energies))
  return { energy: energies[at]!, state: states[at]! }
}

describe('pre-solve', () => {
  it('reduces a problem, and the best answer to what is left is lifted to the optimum of the original', async () => {
    const { app, actor } = test
    // Small enough to try every state here: 15 variables, an optimum by plain counting.
    const random = createRandom(5)
    const n = 15
    const pairs = Array.from({ length: n }, (_, i) => Array.from({ length: i }, (__, j) => [i, j] as const)).flat()
    const drawn = pairs.filter(([i, j]) => i < 13 || j === i - 13).map(([i, j]) => [i, j, random.below(9) - 4] as const)
    const fields = Array.from({ length: n }, () => random.below(5) - 2)
    const text = ['# form = ising', ...drawn.map((term) => term.join(' ')), ...fields.map((h, i) => `${i} ${i} ${h}`)]
    const id = await upload(text.join('\n'), { form: 'ising' })
    const energyOf = (code: number): number => {
      const s = (i: number): number => ((code >> i) & 1 ? 1 : -1)
      return fields.reduce(
        (e, h, i) => e + h * s(i),
        drawn.reduce((e, [i, j, b]) => e + b * s(i) * s(j), 0),
      )
    }
    const optimum = Math.min(...Array.from({ length: 2 ** n }, (_, code) => energyOf(code)))

    const view = await presolveView(app, actor, id)
    // Components of at most 20 variables are solved outright.
    expect(view).toMatchObject({ optimum, bound: optimum, isExact: true, after: { variables: 0, interactions: 0 } })
    expect(view.removed.every(({ value }) => value === 1 || value === -1)).toBe(true)
    const state = Array.from({ length: n }, (_, i) => view.removed.find(({ label }) => label === String(i))!.value!)
    expect(await energiesOf(app, actor, id, { form: 'ising', states: [state] })).toEqual([optimum])
    await expect(saveReduced(app, actor, id, {})).rejects.toMatchObject({
      kind: 'wrong state',
      code: 'presolve.solved',
      message: expect.stringContaining(`The optimum is ${optimum}, proved`),
    })
  })

  it('saves what is left as a problem of its own, linked both ways, whose answers lift with equal energies', async () => {
    const { app, actor } = test
    const id = await upload(mixedProblem(1), { form: 'ising' })
    const view = await presolveView(app, actor, id)
    expect(view.before.variables).toBe(39)
    expect(view.after.variables).toBeLessThanOrEqual(24)
    expect(view.after.variables).toBeGreaterThan(20)
    const saved = await saveReduced(app, actor, id, {})
    expect(saved).toMatchObject({ name: 'Berths reduced', ...view.after })

    const source = (await findProblem(app.db, actor.workspaceId, id))!
    const reduced = (await findProblem(app.db, actor.workspaceId, saved.id))!
    expect((await reductionLinks(app, source)).reduced).toMatchObject([{ id: saved.id, fromVersion: 1, ...view.after }])
    expect((await reductionLinks(app, reduced)).reducedFrom).toMatchObject({
      id,
      version: 1,
      isThere: true,
      summary: { byRule: view.byRule },
    })

    const best = await leastByDescent(saved.id, 400)
    const lifted = await liftStates(app, actor, saved.id, { form: 'ising', states: [best.state] })
    expect(lifted.energies).toEqual([best.energy])
    expect(lifted.labels).toHaveLength(39)
    expect(lifted.problem).toMatchObject({ id, name: 'Berths' })
    // No descent on the original, from anywhere, comes lower.
    expect((await leastByDescent(id, 400)).energy).toBeGreaterThanOrEqual(best.energy)
    // Bits lift to the same state.
    const bits = best.state.map((s) => (s + 1) / 2)
    const asBits = await liftStates(app, actor, saved.id, { form: 'qubo', states: [bits] })
    expect(asBits.states[0]!.map((x) => 2 * x - 1)).toEqual(lifted.states[0])
  })

  it('is turned with the sense: a problem to be maximised has an upper bound and lifts to its own energies', async () => {
    const { app, actor } = test
    const id = await upload(mixedProblem(2), { form: 'ising', sense: 'max' })
    const view = await presolveView(app, actor, id)
    const saved = await saveReduced(app, actor, id, { name: 'What is left' })
    expect(saved.name).toBe('What is left')
    const state = Array.from({ length: saved.variables }, (_, i) => (i % 2 === 0 ? 1 : -1))
    const [energy] = await energiesOf(app, actor, saved.id, { form: 'ising', states: [state] })
    const lifted = await liftStates(app, actor, saved.id, { form: 'ising', states: [state] })
    expect(lifted.energies).toEqual([energy])
    expect(view.bound).toBeGreaterThanOrEqual(energy!)
  })

  it('composes: a reduced problem reduced again lifts to the first, also once the one between is gone for good', async () => {
    const { app, actor } = test
    // The first reduction is made by hand: a spin that always opposes core0 is left out, at an energy of −1.
    const text = mixedProblem(3)
    const [id, between] = [
      await upload(`${text}\nextra core0 1\n`, { form: 'ising' }),
      await upload(text, { form: 'ising' }),
    ]
    const [source, row] = [await rowOf(id), await rowOf(between)]
    const [whole, left] = [await problemData(app, source), await problemData(app, row)]
    const placeOf = (label: string): number => whole.labels.indexOf(label)
    const extra = { rule: 'leaf', variable: placeOf('extra'), first: placeOf('core0'), quantities: [] } as const
    const level = {
      form: 'ising',
      variables: whole.labels.length,
      kept: Uint32Array.from(left.labels, placeOf),
      steps: packSteps([{ ...extra, table: TABLES.opposite }]),
      labels: whole.labels,
      sense: 'min',
      source: { id, number: source.number, name: source.name, version: 1 },
    } as const
    const blobId = await app.blobs.write(packRecord({ coefficients: coefficientsOf(left), levels: [level] }))
    await app.db.transaction(async (tx) => {
      const made = { seconds: 0, version: app.version, createdAt: app.now() }
      await insertReduction(tx, { problemId: between, sourceId: id, sourceVersion: 1, blobId, summary: {}, ...made })
      await app.blobs.adopt(tx, blobId)
    })

    const last = await saveReduced(app, actor, between, {})
    const states = [Array.from({ length: last.variables }, (_, i) => (i % 3 === 0 ? 1 : -1))]
    const energies = await energiesOf(app, actor, last.id, { form: 'ising', states })
    const lifted = await liftStates(app, actor, last.id, { form: 'ising', states })
    expect(lifted.through.map((problem) => problem.id)).toEqual([between, id])
    expect(lifted.problem.id).toBe(id)
    expect(lifted.energies).toEqual([energies[0]! - 1])
    const at = app.now()
    await app.db.transaction((tx) => hide(tx, 'problem', between, at))
    await app.db.transaction((tx) => deleteForGood(tx, 'problem', between, new Date(at.getTime() + 1)))
    expect(await liftStates(app, actor, last.id, { form: 'ising', states })).toEqual(lifted)
  })

  it('lifts the answers of returned samples, with energies worked out anew from the original', async () => {
    const { app, actor } = test
    const id = await upload(mixedProblem(9), { form: 'ising', sense: 'max' })
    const saved = await saveReduced(app, actor, id, {})
    const machineId = await test.machine({ kind: 'zephyr', m: 3, t: 4 })
    const embedding = await startEmbedding(app, actor, createEmbeddingSchema.parse({ problemId: saved.id, machineId }))
    await test.finished(embedding.jobId)
    const sheet = await createRunSheet(app, actor, createRunSheetSchema.parse({ embeddingId: embedding.id, reads: 20 }))
    const run = await startRehearsal(app, actor, sheet.id, rehearseSchema.parse({ reads: 20, sweeps: 50 }))
    await test.finished(run.jobId)
    const view = await returnView(app, actor, run.returnId, 'majority', false)
    expect(view.liftedTo).toMatchObject({ id, variables: 39, isThere: true })
    expect(view.solutions.length).toBeGreaterThan(0)
    const states = view.solutions.map(({ lifted }) => Object.values(lifted!.assignment))
    const energies = await energiesOf(app, actor, id, { form: 'ising', states })
    view.solutions.forEach(({ energy, lifted }, k) => {
      expect(lifted).toMatchObject({ energy, isEqual: true })
      expect(energies[k]).toBe(energy)
    })
    // An answer sheet holds lifted assignments against the groups of the original, variables taken out included.
    const labels = Object.keys(view.solutions[0]!.lifted!.assignment)
    const groups = [{ name: 'all', kind: 'at most', k: 1, members: labels }]
    await putGroups(app, actor, id, saveGroupsSchema.parse({ groups }))
    const answer = await answerView(app, actor, run.returnId, { decode: 'majority', assignments: 2 })
    const atOne = answer.assignments.map(({ assignment }) => labels.filter((label) => assignment[label] === 1).length)
    expect(answer.groups).toEqual([
      { name: 'all', kind: 'at most', k: 1, members: 39, atOne, kept: atOne.map((count) => count <= 1) },
    ])
    expect(answer.assignments[0]!.broken).toEqual(atOne[0]! > 1 ? ['all'] : [])
    const rows = await solutionsOf(app, actor, run.returnId, { decode: 'majority', limit: 3, feasibleOnly: false })
    const [head, first] = solutionsCsv(inOriginal(rows)).split('\n')
    expect(head!.split(',')).toEqual(['energy', 'count', 'distance', ...Object.keys(rows[0]!.lifted!.assignment)])
    expect(first!.split(',').slice(3).map(Number)).toEqual(Object.values(rows[0]!.lifted!.assignment))
  })

  it('has no more to give on what it left, and nothing to lift where nothing was reduced', async () => {
    const { app, actor } = test
    const id = await upload(mixedProblem(7), { form: 'ising' })
    const first = await saveReduced(app, actor, id, {})
    expect(await presolveState(app, actor, first.id)).toMatchObject({
      state: 'done',
      summary: { before: { variables: first.variables }, after: { variables: first.variables } },
    })
    await expect(saveReduced(app, actor, first.id, {})).rejects.toMatchObject({ code: 'presolve.nothing' })
    await expect(liftStates(app, actor, id, { form: 'ising', states: [] })).rejects.toMatchObject({ code: 'lift.none' })
  })

  it('keeps lifting when the original was deleted for good, without energies to compare with', async () => {
    const { app, actor } = test
    const id = await upload(mixedProblem(4), { form: 'ising' })
    const saved = await saveReduced(app, actor, id, {})
    const states = [Array.from({ length: saved.variables }, () => 1)]
    const before = await liftStates(app, actor, saved.id, { form: 'ising', states })
    const at = app.now()
    await app.db.transaction((tx) => hide(tx, 'problem', id, at))
    await app.db.transaction((tx) => deleteForGood(tx, 'problem', id, new Date(at.getTime() + 1)))
    expect(await liftStates(app, actor, saved.id, { form: 'ising', states })).toEqual({ ...before, energies: null })
    const reduced = (await findProblem(app.db, actor.workspaceId, saved.id))!
    expect((await reductionLinks(app, reduced)).reducedFrom).toMatchObject({ id, isThere: false })
  })

  it('lists every variable taken out as a file, and refuses other workspaces and states that do not fit', async () => {
    const { app, actor } = test
    const id = await upload('a a 1\n"b, c" "b, c" -2\na "b, c" 1\nb d 0.1\n')
    const { fileName, bytes } = await presolveFile(app, actor, id)
    expect(fileName).toMatch(/^P-\d+-presolve\.csv$/)
    const lines = Buffer.from(bytes).toString().trim().split('\n')
    expect(lines).toHaveLength(1 + (await presolveView(app, actor, id)).removedCount)
    expect(lines[0]).toMatch(/^order,variable,rule,value,/)
    const elsewhere = { ...actor, workspaceId: 'elsewhere' }
    await expect(presolveView(app, elsewhere, id)).rejects.toMatchObject({ kind: 'not found' })
    const reduced = await saveReduced(app, actor, await upload(mixedProblem(6), { form: 'ising' }), {})
    await expect(liftStates(app, actor, reduced.id, { form: 'ising', states: [[1]] })).rejects.toMatchObject({
      code: 'energy.length',
    })
  })

  it('stops when nobody waits any more, and keeps nothing of what was cut short', async () => {
    const { app, actor } = test
    const random = createRandom(8)
    const lines = Array.from(
      { length: 40_000 },
      () => `${random.below(4000)} ${4000 + random.below(4000)} ${random.below(9) - 4}`,
    )
    const id = await upload(lines.join('\n'), { form: 'ising' })
    const gone = new AbortController()
    const asked = presolveView(app, actor, id, undefined, gone.signal)
    gone.abort()
    expect((await asked).isStopped).toBe(true)
    expect(await presolveState(app, actor, id)).toEqual({ state: 'not run' })
    expect((await presolveView(app, actor, id)).isStopped).toBe(false)
    expect(await presolveState(app, actor, id)).toMatchObject({ state: 'done' })
  })
})
