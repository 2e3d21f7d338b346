import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { withAdvice } from '../../server/services/apply-advice'
import { startEmbedding } from '../../server/services/embeddings'
import { nextDraft } from '../../server/services/next-draft'
import { startReference } from '../../server/services/reference-start'
import { programmeBench } from '../../server/services/programming'
import { startRehearsal } from '../../server/services/rehearsals'
import { analysisView } from '../../server/services/return-analysis'
import { returnView } from '../../server/services/return-view'
import { benchOf, createRunSheet, runSheetRow, runSheetsOf } from '../../server/services/run-sheets'
import { createRandom } from '../../shared/engine/random'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { startReferenceSchema } from '../../shared/schemas/reference'
import { analysisQuerySchema, nextDraftSchema } from '../../shared/schemas/return-analysis'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
let problemId = ''
let embeddingId = ''

/** Twelve variables, all interacting: chains of several qubits on a small machine. */
function denseProblem(): string {
  const random = createRandom(8)
  const lines = ['# form: ising', '# sense: max']
  for (let i = 0; i < 12; i++)
    for (let j = i + 1; j < 12; j++) lines.push(`v${i} v${j} ${(2 * random.below(2) - 1) * (1 + random.below(3))}`)
  return lines.join('\n')
}

beforeAll(async () => {
  test = await startTestApp(2)
  problemId = await test.problem(denseProblem())
  const machineId = await test.machine({ kind: 'chimera', m: 4, t: 4 })
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 1, tries: 2, timeLimitSeconds: 20 })
  const { id, jobId } = await startEmbedding(test.app, test.actor, search)
  await test.finished(jobId)
  embeddingId = id
  const reference = await startReference(test.app, test.actor, problemId, startReferenceSchema.parse({}))
  await test.finished(reference.jobId!)
})
afterAll(() => test.close())

const analysis = (id: string, query: Record<string, unknown> = {}) =>
  analysisView(test.app, test.actor, id, analysisQuerySchema.parse(query))
const draft = (id: string, request: Record<string, unknown>) =>
  nextDraft(test.app, test.actor, id, nextDraftSchema.parse(request))

/** Chains of two or more qubits of a run sheet, with strength and bound. */
async function chainsOf(id: string) {
  const row = await runSheetRow(test.app, test.actor, id)
  const bench = await benchOf(test.app, test.actor, row)
  const { layout, strengths, bounds } = programmeBench(bench, row.settings)
  return bench.labels
    .map((label, variable) => ({ label, variable, strength: strengths[variable]!, bound: bounds.bound[variable]! }))
    .filter(({ variable }) => layout.chainLength[variable]! > 1)
}

async function prepared(settings: Record<string, unknown>): Promise<string> {
  const input = createRunSheetSchema.parse({ embeddingId, ...settings })
  return (await createRunSheet(test.app, test.actor, input)).id
}

async function rehearsed(sheetId: string): Promise<string> {
  const input = rehearseSchema.parse({ reads: 400, sweeps: 200, temperature: 0.08, seed: 3 })
  const { returnId, jobId } = await startRehearsal(test.app, test.actor, sheetId, input)
  await test.finished(jobId)
  return returnId
}

/** A run sheet whose chains are all held a little above their bounds, but for one at 40 % of it. */
async function withWeakChain() {
  const held = await chainsOf(await prepared({ strength: { rule: 'cut' } }))
  const weak = held.reduce((a, b) => (b.bound > a.bound ? b : a))
  const perChain = Object.fromEntries(held.map(({ label, strength }) => [label, strength]))
  perChain[weak.label] = 0.4 * weak.bound
  const strength = { rule: 'manual', value: 1, perChain }
  const sheetId = await prepared({ strength, gauges: 4, reads: 400 })
  return { weak, sheetId, returnId: await rehearsed(sheetId) }
}

const breaksOf = async (returnId: string, label: string) =>
  (await returnView(test.app, test.actor, returnId, 'majority', false)).breaks!.chains.find(
    (chain) => chain.label === label,
  )!

describe('a planted weak chain', () => {
  it('is named first, and the next draft mends it', async () => {
    const { weak, sheetId, returnId } = await withWeakChain()
    const { advice, scale } = await analysis(returnId)
    expect(advice[0]).toMatchObject({
      kind: 'raise-named',
      isSetting: true,
      action: { set: 'strength of chains', variables: [weak.variable] },
    })
    expect(advice[0]!.evidence[1]).toMatchObject({ name: `k of ${weak.label} as a share of its bound` })
    expect(advice[0]!.evidence[1]!.value).toBeCloseTo(0.4, 9)
    expect(scale.outlook).not.toBeNull()

    const before = (await runSheetsOf(test.app, test.actor, { limit: 100 })).items.length
    const dry = await draft(returnId, { items: ['raise-named'], dryRun: true })
    expect(dry).toMatchObject({ id: null, number: null, madeFrom: { id: sheetId } })
    expect(dry.changes.map(({ field }) => field)).toContain(`k of ${weak.label}`)
    expect((await runSheetsOf(test.app, test.actor, { limit: 100 })).items).toHaveLength(before)

    const made = await draft(returnId, { items: ['raise-named'] })
    expect(made.changes).toEqual(dry.changes)
    expect(await runSheetRow(test.app, test.actor, made.id!)).toMatchObject({ state: 'draft', madeFromId: sheetId })
    const [given, next] = [await chainsOf(sheetId), await chainsOf(made.id!)]
    const mended = next.find(({ label }) => label === weak.label)!
    expect(mended.strength).toBeGreaterThanOrEqual(mended.bound)
    const others = (chains: typeof next) => chains.filter(({ label }) => label !== weak.label)
    expect(others(next)).toEqual(others(given))

    const [was, is] = [await breaksOf(returnId, weak.label), await breaksOf(await rehearsed(made.id!), weak.label)]
    expect(was.low).toBeGreaterThan(is.high)
  }, 60_000)
})

describe('the analysis', () => {
  it('agrees with the summary, and grows with the gap', async () => {
    const returnId = await rehearsed(await prepared({ strength: { rule: 'cut' }, gauges: 3, reads: 400 }))
    const summary = await returnView(test.app, test.actor, returnId, 'majority', false)
    const [none, some] = [await analysis(returnId), await analysis(returnId, { gap: 12 })]
    expect(none.success).toMatchObject({ count: summary.reference!.success.count, total: 400, isTimeMeasured: false })
    expect(none.success!.reference.energy).toBe(summary.reference!.energy)
    expect(some.success!.count).toBeGreaterThan(none.success!.count)
    expect(some.success!.r99.value!).toBeLessThan(none.success!.r99.value!)

    expect(none.gauges.map(({ gauge, reads }) => [gauge, reads])).toEqual([
      [0, 134],
      [1, 133],
      [2, 133],
    ])
    const chainBreaks = summary.breaks!.chainReads.count
    expect(none.gauges.reduce((sum, { chainReads }) => sum + chainReads.count, 0)).toBe(chainBreaks)
    for (const groups of Object.values(none.breaks))
      expect(groups.reduce((sum, group) => sum + group.breaks, 0)).toBe(chainBreaks)
    expect(none.gaugeTests.map(({ of }) => of)).toContain('energies')
    expect(none.temperature!.rows).toBe(400)
    expect(none.gauges[0]!.temperature!.rows).toBe(134)

    const decoded = summary.decodings.find(({ decoding }) => decoding === 'majority')!
    const mean = none.gauges.reduce((sum, { reads, energy }) => sum + reads * energy!.mean, 0) / 400
    expect(mean).toBeCloseTo(decoded.mean!, 9)
  }, 60_000)

  it('counts discarded reads as no success', async () => {
    const returnId = await rehearsed(await prepared({ strength: { rule: 'rms', value: 0.7 }, reads: 400 }))
    const summary = await returnView(test.app, test.actor, returnId, 'discard', false)
    const { success, gauges } = await analysis(returnId, { decode: 'discard' })
    expect(success).toMatchObject({ count: summary.reference!.success.count, total: 400 })
    expect(gauges.map(({ gauge, reads }) => [gauge, reads])).toEqual([[0, 400]])
  }, 60_000)

  it('refuses advice that was not given, and samples of another workspace', async () => {
    const returnId = await rehearsed(await prepared({ strength: { rule: 'cut' }, gauges: 3, reads: 400 }))
    await expect(draft(returnId, { items: ['pause'] })).rejects.toThrow(/no advice of the kind pause/)
    const stranger = { ...test.actor, workspaceId: 'another' }
    await expect(analysisView(test.app, stranger, returnId, analysisQuerySchema.parse({}))).rejects.toThrow(/no such/)
    expect(() => nextDraftSchema.parse({ items: [] })).toThrow()
    expect(() => analysisQuerySchema.parse({ gap: -1 })).toThrow()
  }, 60_000)
})

describe('withAdvice', () => {
  it('follows each action, and names chains last', async () => {
    const row = await runSheetRow(test.app, test.actor, await prepared({ strength: { rule: 'cut', value: 1.2 } }))
    const bench = await benchOf(test.app, test.actor, row)
    const { settings } = row
    expect(withAdvice(bench, settings, [{ set: 'gauges', to: 7 }])).toEqual({ ...settings, gauges: 7 })
    expect(withAdvice(bench, settings, [{ set: 'reads', to: 900 }])).toEqual({ ...settings, reads: 900 })
    expect(withAdvice(bench, settings, [{ set: 'interaction couplers', to: 'one' }]).interactionCouplers).toBe('one')
    expect(withAdvice(bench, { ...settings, scale: 0.01 }, [{ set: 'scale', to: 'fit' }]).scale).toBeNull()
    expect(withAdvice(bench, settings, [{ look: 'coefficients' }])).toEqual(settings)
    const paused = withAdvice(bench, settings, [{ set: 'pause', s: 0.45678 }])
    expect(paused.schedule).toHaveLength(4)
    expect(paused.schedule![1]!.s).toBe(0.457)
    expect(paused.annealMicroseconds).toBe(2 * settings.annealMicroseconds)

    const strengthsOf = (next: typeof settings) => programmeBench(bench, next).strengths
    const [cut, before] = [programmeBench(bench, settings).bounds.bound, strengthsOf(settings)]
    const chain = before.findIndex((k, i) => k > 0 && cut[i]! > 0)
    expect(withAdvice(bench, settings, [{ set: 'strength of all', factor: 1.5 }]).strength).toEqual({
      rule: 'cut',
      value: expect.closeTo(1.8, 12),
    })
    const half = withAdvice(bench, settings, [{ set: 'strength of all', factor: 0.5 }])
    expect(half.strength.rule).toBe('manual')
    expect(strengthsOf(half)[chain]).toBeCloseTo(before[chain]! / 2, 12)
    const both = withAdvice(bench, settings, [
      { set: 'strength of chains', variables: [chain], margin: 1.05 },
      { set: 'strength of all', factor: 0.5 },
    ])
    expect(strengthsOf(both)[chain]).toBeCloseTo(1.05 * cut[chain]!, 12)
  })

  it('gives a chosen scale up that no longer fits', async () => {
    const row = await runSheetRow(test.app, test.actor, await prepared({ strength: { rule: 'fixed', value: 1 } }))
    const bench = await benchOf(test.app, test.actor, row)
    const scale = programmeBench(bench, row.settings).result.programmed!.scale
    const next = withAdvice(bench, { ...row.settings, scale }, [{ set: 'strength of all', factor: 2 }])
    expect(next.scale).toBeNull()
  })
})
