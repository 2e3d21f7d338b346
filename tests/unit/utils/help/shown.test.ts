import { describe, expect, it } from 'vitest'
import { embeddingStats } from '../../../../shared/engine/embedding/stats'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { interactionGraph } from '../../../../shared/engine/problem/interaction-graph'
import { structureOf } from '../../../../shared/engine/problem/structure'
import { cutBounds } from '../../../../shared/engine/programming/cut-bounds'
import { machineTimeEstimate } from '../../../../shared/engine/programming/machine-time'
import { pullsOf } from '../../../../shared/engine/programming/strength'
import { wilson } from '../../../../shared/engine/readout/intervals'
import type { EmbeddingView } from '../../../../shared/schemas/embeddings'
import type { MachineView } from '../../../../shared/schemas/machines'
import type { ProblemView, StructureView } from '../../../../shared/schemas/problems'
import type { ReturnView } from '../../../../shared/schemas/returns'
import type { ChainRow, RunSheetSettings, RunSheetView } from '../../../../shared/schemas/run-sheets'
import type { Bench } from '../../../../server/services/programming'
import { layoutInput, programmeBench, requireProgrammed } from '../../../../server/services/programming'
import { precisionOf } from '../../../../server/services/precision'
import { compareRules, isingSizes, scaleLimitOf } from '../../../../server/services/strength-rules'
import { embeddingFacts } from '../../../../utils/embedding/facts'
import { formatPercent, formatSignificant, THIN_SPACE } from '../../../../utils/format'
import { explain } from '../../../../utils/help/registry'
import { machineFacts } from '../../../../utils/machine/facts'
import { problemFacts } from '../../../../utils/problem/reading'
import { returnFacts } from '../../../../utils/returns/facts'
import {
  boundCases,
  coefficientsHelp,
  noiseHelp,
  scaleHelp,
  sigmaHelp,
  smallestHelp,
  strengthHelp,
  timeHelp,
} from '../../../../utils/run-sheet/help'
import { shareText, smallestText } from '../../../../utils/run-sheet/strength'
import type { Fact } from '../../../../utils/ui/parts'
import { randomInstance } from '../../engine/programming/instances'

/*
 * What stands in a popover is what the page shows: the engine computes a number one way, and the formula shown, worked
 * out from the inputs listed beside it, must read the same.
 */

/** Facts of a strip as shown, and as explained, for those with a single explanation. */
function bothWays(facts: readonly Fact[]): [label: string, shown: string, explained: string][] {
  return facts.flatMap(({ label, value, help }) => (help ? [[label, String(value), explain(help).result]] : []))
}

const agreeing = (facts: readonly Fact[]) => {
  const pairs = bothWays(facts)
  for (const [label, shown, explained] of pairs) expect(`${label} ${explained}`).toBe(`${label} ${shown}`)
  return pairs.map(([label]) => label)
}

const SEEDS = [1, 2, 3, 4, 5, 6, 7, 8]
const instanceOf = (seed: number) =>
  randomInstance(seed, { order: 40, sizes: [6, 5, 4, 3, 2, 2, 1, 1], density: 0.2, field: seed % 2 ? 0 : 3 })

describe('facts of a problem', () => {
  it.each(SEEDS)('read as their formulas give (%d)', (seed) => {
    const structure = structureOf(instanceOf(seed).ising) as StructureView
    const facts = problemFacts({ structure, best: -12.5, sense: 'min' } as ProblemView)
    const labels = agreeing(facts)
    expect(labels).toEqual(
      expect.arrayContaining(['Density', 'Highest degree', 'Dynamic range', 'Components', 'Treewidth', 'Best energy']),
    )
  })

  it('say how the dynamic range is defined where its ends were not kept', () => {
    const { steps, inputs, result } = explain({ id: 'dynamicRange', given: { value: 16, sizes: undefined } })
    expect([steps, inputs, result]).toEqual([[], [], '16'])
  })
})

describe('facts of an embedding', () => {
  it.each(SEEDS)('read as their formulas give (%d)', (seed) => {
    const { ising, embedding, machine } = instanceOf(seed)
    const stats = embeddingStats(embedding, interactionGraph(ising), machine)
    const view = {
      status: 'found',
      method: 'imported',
      problem: { variables: ising.n, interactions: ising.values.length },
      machine: { qubits: machine.order },
      stats: {
        ...stats,
        lengthHistogram: [...stats.lengthHistogram],
        unusedShare: 1 - stats.qubitsUsed / machine.order,
      },
    } as unknown as EmbeddingView
    expect(agreeing(embeddingFacts(view, null))).toHaveLength(5)
    const used = explain(embeddingFacts(view, null).find(({ label }) => label === 'Qubits used')!.help!)
    expect(used.steps[1]!.value).toBe(formatPercent(view.stats!.unusedShare))
  })
})

describe('facts of a machine', () => {
  const families: PublishedFamily[] = [
    { kind: 'chimera', m: 3, n: 4, t: 2 },
    { kind: 'pegasus', m: 3, trimmed: true },
    { kind: 'pegasus', m: 3, trimmed: false },
    { kind: 'zephyr', m: 2, t: 4 },
    { kind: 'king', width: 5, height: 7 },
    { kind: 'square', width: 4, height: 6 },
    { kind: 'cubic', width: 4, height: 3, depth: 5 },
    { kind: 'heavy-hex', rows: 3, columns: 4 },
  ]

  it.each(families)('count qubits and couplers as the construction has them: $kind', (family) => {
    const { graph } = buildFabric(family)
    const couplers = graph.ends.length / 2
    const machine = {
      familySizes: family,
      family: family.kind,
      qubits: graph.order - 2,
      qubitsMade: graph.order,
      couplers: couplers - 5,
      couplersMade: couplers,
      maxDegree: 6,
      calibration: 2,
      shown: 2,
      sheet: {
        ranges: { h: [-4, 4], J: [-2, 1], couplingSum: [-9, 9] },
        defects: { qubits: [0, 1, 1], couplers: [] },
        temperatureMillikelvin: null,
      },
    } as unknown as MachineView
    expect(agreeing(machineFacts(machine))).toHaveLength(6)
    expect(explain({ id: 'qubitsMade', given: { family } }).steps[0]!.values).toEqual([graph.order])
    const made = explain({ id: 'couplersMade', given: { family, couplers } })
    if (made.steps.length > 0) expect(made.steps[0]!.values).toEqual([couplers])
    else expect(made.method).toContain('Counted')
  })
})

const settings: RunSheetSettings = {
  strength: { rule: 'fixed', value: 1.5 },
  fieldSplit: 'even',
  interactionCouplers: 'all',
  chainCouplers: 'all',
  gauges: 4,
  reads: 250,
  annealMicroseconds: 72,
  schedule: null,
  scale: null,
  seed: 1,
}
const timing = { programmingMicroseconds: 14_200, readoutMicroseconds: 123, delayMicroseconds: 21 }

/** A run sheet as the server shows it, as far as its numbers go. */
function runSheetOf(seed: number, couplingSum: readonly [number, number] | null) {
  const instance = instanceOf(seed)
  const labels = Array.from({ length: instance.ising.n }, (_, i) => `v${i}`)
  const ranges = { h: [-2, 2], J: [-2, 1], couplingSum }
  const sheet = { ranges, controlError: { h: 0.03, J: 0.015 }, timing }
  const bench = { ...instance, labels, machine: { graph: instance.machine, sheet } } as unknown as Bench
  const programming = programmeBench(bench, settings)
  const { bounds } = programming
  const programmed = requireProgrammed(programming)
  const pulls = pullsOf(instance.ising)
  const { offsets } = instance.embedding
  const view = {
    settings,
    ising: isingSizes(bench),
    rules: compareRules(bench, settings, programming),
    scale: programmed.scale,
    scaleLimit: scaleLimitOf(bench, programmed),
    precision: precisionOf(bench, programmed),
    machineTime: {
      timing,
      totalMilliseconds:
        machineTimeEstimate({
          gauges: settings.gauges,
          reads: settings.reads,
          annealMicroseconds: settings.annealMicroseconds,
          timing: {
            programMicroseconds: timing.programmingMicroseconds,
            readoutMicroseconds: timing.readoutMicroseconds,
            delayMicroseconds: timing.delayMicroseconds,
          },
        }).totalMicroseconds / 1000,
    },
    chainTotals: { qubits: instance.embedding.qubits.length },
  } as unknown as RunSheetView
  const chains = labels.map((label, i) => ({
    variable: i,
    label,
    qubits: offsets[i + 1]! - offsets[i]!,
    cutBound: bounds.bound[i]!,
    cutBoundExact: bounds.exact[i] === 1,
    cutSplit: offsets[i + 1]! - offsets[i]! > 1 ? bounds.splits[i]! : null,
    pull: pulls[i]!,
    field: instance.ising.linear[i]!,
  })) as unknown as ChainRow[]
  return { view, bench, chains }
}

/** The values of the number asked about. */
const valueOf = (help: Parameters<typeof explain>[0]): number => explain(help).steps.at(-1)!.values[0]!

describe('numbers of a run sheet', () => {
  it.each(SEEDS)('strengths, rule by rule and chain by chain (%d)', (seed) => {
    const { view, chains } = runSheetOf(seed, null)
    expect(view.rules.map(({ rule }) => rule)).toEqual(['fixed', 'rms', 'choi', 'cut'])
    for (const rule of view.rules) {
      const { help, cases } = strengthHelp(view, rule, chains)
      const strengths = help ? [valueOf(help)] : cases!().map((item) => valueOf(item.help))
      expect(Math.min(...strengths)).toBeCloseTo(rule.k.min, 10)
      expect(Math.max(...strengths)).toBeCloseTo(rule.k.max, 10)
    }
  })

  it.each(SEEDS)('scale, from the value and the range that decide it (%d)', (seed) => {
    for (const couplingSum of [null, [-3, 3]] as const) {
      const { view } = runSheetOf(seed, couplingSum)
      for (const rule of view.rules) {
        expect(rule.scaleLimit === null).toBe(rule.scale === 1)
        expect(explain(scaleHelp(rule).help!).result).toBe(formatSignificant(rule.scale))
      }
    }
  })

  it('the range that decides is told, sums of couplings among them', () => {
    const limits = SEEDS.map((seed) => runSheetOf(seed, [-0.5, 0.5]).view.scaleLimit!)
    expect(limits.map(({ range }) => range)).toContain('coupling sum')
    for (const { limit, value } of limits) expect(limit * value).toBeGreaterThan(0)
  })

  it.each(SEEDS)('shares under 2σ and energy noise (%d)', (seed) => {
    const { view } = runSheetOf(seed, null)
    const { couplingsUnderTwoSigma: couplings, fieldsUnderTwoSigma: fields, energyNoise } = view.precision
    for (const [what, share] of [
      ['couplings', couplings],
      ['fields', fields],
    ] as const) {
      const { help } = sigmaHelp(view.precision, what, share)
      if (help) expect(explain(help).result).toBe(formatPercent(share, { significant: 2 }))
      else expect(share).toBeNull()
    }
    expect(explain(noiseHelp(view).help!).result).toBe(formatSignificant(energyNoise, 3))
  })

  it.each(SEEDS)(
    'the smallest coefficient over σ, and the share of coefficients under 2σ, rule by rule (%d)',
    (seed) => {
      const { view, bench } = runSheetOf(seed, null)
      const { linear, values } = bench.ising
      const { sigmaH, sigmaJ } = view.precision
      for (const rule of view.rules) {
        const ratios = [
          ...Array.from(linear, (h) => (rule.scale * Math.abs(h)) / sigmaH),
          ...Array.from(values, (J) => (rule.scale * Math.abs(J)) / sigmaJ),
        ].filter((ratio) => ratio > 0)
        expect(valueOf(smallestHelp(rule).help!)).toBeCloseTo(Math.min(...ratios), 10)
        expect(smallestText(rule)).toMatch(new RegExp(`^[hJ], ${formatSignificant(Math.min(...ratios))}$`))
        const under = ratios.filter((ratio) => ratio < 2).length
        expect(rule.coefficients).toEqual({ under, of: ratios.length })
        expect(explain(coefficientsHelp(view.precision, rule.coefficients!).help!).result).toBe(
          shareText(rule.coefficients),
        )
      }
    },
  )

  it.each(SEEDS)('cut bounds, from the split that gives them (%d)', (seed) => {
    const { chains, bench } = runSheetOf(seed, null)
    const { bound } = cutBounds(layoutInput(bench, settings))
    const explained = new Map(boundCases(chains).map(({ label, help }) => [label, valueOf(help)]))
    expect(explained.size).toBe(6)
    for (const [label, value] of explained) expect(value).toBeCloseTo(bound[Number(label.slice(1))]!, 10)
  })

  it('machine time, in the unit of the strip', () => {
    const { view } = runSheetOf(1, null)
    // 4 × 14.2 ms + 250 × (72 + 123 + 21) µs
    expect(view.machineTime.totalMilliseconds).toBeCloseTo(56.8 + 54, 10)
    expect(explain(timeHelp(view).help!)).toMatchObject({ result: '111', steps: [{ unit: 'ms' }] })
  })
})

describe('numbers of samples', () => {
  const proportion = (count: number, total: number) => ({ count, total, rate: count / total, ...wilson(count, total) })

  it.each([
    [0, 1000],
    [1, 1000],
    [592, 1000],
    [1000, 1000],
    [3, 7],
  ])('rates and their intervals: %d of %d', (count, total) => {
    const samples = {
      source: 'rehearsal',
      decode: 'majority',
      problem: { sense: 'min' },
      reads: total,
      made: {},
      seconds: 1,
      decodings: [{ decoding: 'majority', ties: 4 }],
      best: { parts: { linear: -3.5, interactions: 8.25, offset: 1 } },
      energies: { best: 5.75, bestCount: 2 },
      breaks: { readsWithBreak: proportion(count, total), chainReads: proportion(count, 36 * total) },
    } as unknown as ReturnView
    const facts = returnFacts(samples)
    expect(agreeing(facts)).toEqual(['Best energy', 'Reads with a break', 'Chain reads broken', 'Ties'])
    const withBreak = facts.find(({ label }) => label === 'Reads with a break')!
    const { steps, caution } = explain(withBreak.help!)
    expect(steps.at(-1)!.value).toBe(`${withBreak.note}${THIN_SPACE}%`)
    const { low, high } = wilson(count, total)
    expect(steps.at(-1)!.values[0]).toBeCloseTo(low, 11)
    expect(steps.at(-1)!.values[1]).toBeCloseTo(high, 11)
    expect(caution).toContain('not a forecast of the machine')
  })
})
