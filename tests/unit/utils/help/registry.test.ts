import { describe, expect, it } from 'vitest'
import { symbolsOf } from '../../../../utils/help/formula'
import { explain, HELP_IDS, type HelpRequest } from '../../../../utils/help/registry'

const ising = { variables: 4, interactions: 5, greatestJ: 8, greatestH: 3, rmsJ: 4, leastShare: 0.05 }
const chain = { label: 'a', pull: 9, field: -4, cutBound: 6 }
const degrees = [
  { value: 0, count: 1 },
  { value: 2, count: 4 },
]
const size = { variables: 5, interactions: 4 }
const timing = { programmingMicroseconds: 14_200, readoutMicroseconds: 123, delayMicroseconds: 21 }
const noise = { name: 'Alder', fieldsUnder: 2, interactionsUnder: 3, sigmaH: 0.01, sigmaJ: 0.02, scale: 0.5 }
const rate = { count: 3, total: 10, counted: 'reads with a broken chain', of: 'reads', format: { significant: 3 } }
const show = (value: number) => String(value)

/** One request of every kind, with the value that plain arithmetic gives; strings where a procedure gives it. */
const EXAMPLES: readonly (readonly [HelpRequest, number | string])[] = [
  [{ id: 'density', given: size }, 4 / 10],
  [{ id: 'meanDegree', given: { ...size, format: { decimals: 2 } } }, 1.6],
  [{ id: 'degrees', given: { ...size, degrees } }, 2],
  [{ id: 'dynamicRange', given: { value: 16, sizes: { least: 0.5, greatest: 8 } } }, 16],
  [{ id: 'components', given: { ...size, components: 2 } }, '2'],
  [{ id: 'isolated', given: { degrees, isolated: 1 } }, '1'],
  [{ id: 'problemTreewidth', given: { ...size, bound: 3 } }, '≤ 3'],
  [{ id: 'treewidthBelow', given: { ...size, bound: 2 } }, '≥ 2'],
  [{ id: 'bandwidth', given: { bandwidth: 4, order: 'banded', interactions: 9 } }, '4'],
  [{ id: 'underNoise', given: { ...noise, coefficients: 12 } }, 5],
  [{ id: 'underNoise', given: { ...noise, fieldsUnder: 0, interactionsUnder: 0, coefficients: 0 } }, 0],
  [{ id: 'penaltyWeight', given: { coupling: 20, deviating: 1, pairs: 6, greatest: 3 } }, 10],
  [{ id: 'penaltyEnough', given: { weight: 10, needed: 4.5, overlaps: 0 } }, '4.5'],
  [{ id: 'penaltySingle', given: { weight: 10, needed: 18, overlaps: 4 } }, '18'],
  [{ id: 'coupling', given: { form: 'qubo', value: 6 } }, 1.5],
  [{ id: 'coupling', given: { form: 'ising', value: 1.5 } }, 6],
  [{ id: 'presolveBound', given: { bound: -3.5, rounds: 2, sense: 'min', isSolved: false } }, '−3.5'],
  [{ id: 'presolveBound', given: { bound: 4, rounds: 1, sense: 'max', isSolved: true } }, '4'],
  [{ id: 'bestOfProblem', given: { best: -4, sense: 'max' } }, '−4'],
  [
    { id: 'referenceValue', given: { energy: -7, proved: true, tolerance: 0, methods: ['enumeration', 'annealing'] } },
    '−7',
  ],
  [{ id: 'referenceBound', given: { bound: -9, sense: 'min', methods: ['integer programme'] } }, '−9'],
  [{ id: 'referenceGap', given: { energy: -7, bound: -9 } }, 2],
  [{ id: 'gapToReference', given: { best: -5, reference: -7, sense: 'min', proved: true } }, 2],
  [{ id: 'gapToReference', given: { best: 5, reference: 7, sense: 'max', proved: false } }, 2],
  [
    {
      id: 'successRate',
      given: { count: 3, total: 10, reference: -7, proved: true, format: { significant: 3 }, rehearsal: false },
    },
    0.3,
  ],
  [{ id: 'energyOfState', given: { linear: -3, interactions: 1.5, offset: 10, rehearsal: false } }, 8.5],
  [{ id: 'meanEnergy', given: { total: 30, reads: 8 } }, 3.75],
  [{ id: 'medianEnergy', given: { median: 3, reads: 8 } }, '3'],
  [{ id: 'energyBars', given: { counts: [1, 4, 3], width: 2 } }, 8],
  [{ id: 'workingQubits', given: { family: { kind: 'king', width: 3, height: 4 }, missing: 2 } }, 10],
  [{ id: 'qubitsMade', given: { family: { kind: 'zephyr', m: 2, t: 4 } } }, 160],
  [{ id: 'couplersMade', given: { family: { kind: 'square', width: 3, height: 4 }, couplers: 17 } }, 17],
  [{ id: 'workingCouplers', given: { made: 17, working: 15 } }, 15],
  [{ id: 'missingShare', given: { made: 20, working: 15, what: 'qubits' } }, 0.25],
  [{ id: 'expectedChain', given: { median: 7.5, variables: 30, density: 0.2 } }, '7.5'],
  [
    {
      id: 'partRatio',
      given: { neighbours: 12, neighbourRate: 0.05, ratio: 2.34, q: 0.001, tested: 90, spread: 0.8, rehearsal: false },
    },
    '2.3',
  ],
  [{ id: 'machineDegree', given: { degree: 15, qubits: 10, couplers: 15 } }, '15'],
  [{ id: 'range', given: { what: 'J', text: '−2 to 1', calibration: 3 } }, '−2 to 1'],
  [{ id: 'thermalEnergy', given: { millikelvin: 13.1 } }, (0.0131 * 1.380649e-23) / 6.62607015e-34 / 1e9],
  [{ id: 'capacityBound', given: { treewidth: 68 } }, 69],
  [{ id: 'capacityTreewidth', given: { treewidth: 68, qubits: 10, couplers: 15 } }, '68'],
  [{ id: 'completeByTemplate', given: { order: 60, chainLength: 7, seed: 1, tries: 6 } }, '60'],
  [{ id: 'qubitsEach', given: { qubits: 10, variables: 4 } }, 2.5],
  [{ id: 'couplersEach', given: { couplers: 15, interactions: 6 } }, 2.5],
  [{ id: 'longestChain', given: { histogram: [0, 3, 0, 2] } }, 3],
  [{ id: 'meanLength', given: { histogram: [0, 3, 0, 2] } }, 1.8],
  [{ id: 'qubitsUsed', given: { histogram: [0, 3, 0, 2], working: 12 } }, 9],
  [{ id: 'unusedShare', given: { used: 9, working: 12, format: { decimals: 1 } } }, 0.25],
  [{ id: 'meanOfTotals', given: { used: 9, chains: 5 } }, 1.8],
  [{ id: 'chainCouplers', given: { couplers: 5, used: 9, chains: 5 } }, '5'],
  [{ id: 'interactionCouplers', given: { couplers: 7, interactions: 6 } }, '7'],
  [{ id: 'overlap', given: { uses: [0, 8, 3, 1], overlap: 5 } }, 5],
  [{ id: 'unmetInteractions', given: { unmet: 2 } }, '2'],
  [{ id: 'neededQubits', given: { needed: 14, working: 12 } }, '14'],
  [{ id: 'strength', given: { rule: 'fixed', value: 1.25, ising } }, 10],
  [{ id: 'strength', given: { rule: 'rms', value: 2, ising } }, 2 * 4 * Math.sqrt(2.5)],
  [{ id: 'strength', given: { rule: 'rms', value: 2, ising: { ...ising, interactions: 0 } } }, 6],
  [{ id: 'strength', given: { rule: 'choi', value: 1.5, ising, chain } }, 7.5],
  [{ id: 'strength', given: { rule: 'cut', value: 1.5, ising, chain } }, 9],
  [{ id: 'strength', given: { rule: 'cut', value: 1.5, ising, chain: { ...chain, cutBound: 0 } } }, 0.4],
  [{ id: 'strengthEntered', given: { text: '12' } }, '12'],
  [{ id: 'scale', given: { limit: { range: 'J', limit: -2, value: -16 } } }, 0.125],
  [{ id: 'scale', given: { limit: null } }, 1],
  [{ id: 'underTwoSigma', given: { under: 3, total: 12, sigma: 0.02, what: 'fields' } }, 0.25],
  [
    {
      id: 'coefficientOverSigma',
      given: { kind: 'field', value: -3, sigma: 0.02, scale: 0.5, smallest: true },
    },
    75,
  ],
  [{ id: 'coefficientsUnder', given: { under: 3, of: 12, sigmaH: 0.02, sigmaJ: 0 } }, 0.25],
  [{ id: 'scaleAtFactor', given: { factor: 1.5, text: '0.25' } }, '0.25'],
  [{ id: 'chainsBelowBound', given: { below: 3, chains: 12 } }, '3 of 12'],
  [{ id: 'energyNoise', given: { qubits: 9, couplers: 16, sigmaH: 1, sigmaJ: 1, scale: 0.5 } }, 10],
  [{ id: 'cutBound', given: { up: 9, down: 6, cut: 2, exact: true } }, 3],
  [{ id: 'cutBound', given: { up: -1, down: 6, cut: 1, exact: false } }, 0],
  [{ id: 'strengthOverBound', given: { strength: 9, bound: 6 } }, 1.5],
  [{ id: 'machineTime', given: { gauges: 2, reads: 100, anneal: 72, timing, show, unit: 'ms' } }, 28.4 + 21.6],
  [{ id: 'machinePrice', given: { milliseconds: 298, perSecond: 0.75, currency: 'EUR' } }, 0.2235],
  [{ id: 'load', given: { what: 'sum', value: -4, limit: -16, show } }, 0.25],
  [{ id: 'rounding', given: { arithmetic: '16-bit', largestField: 22.4, sigma: 0.02 } }, '0.00035'],
  [{ id: 'rounding', given: { arithmetic: '32-bit', largestField: 2 ** 13, sigma: null } }, '0.00049'],
  [{ id: 'rounding', given: { arithmetic: '64-bit', largestField: 2, sigma: null } }, '0'],
  [
    { id: 'physicalTemperature', given: { millikelvin: 15, B: 10 } },
    ((1.380649e-23 / 6.62607015e-34 / 1e9) * 0.015) / 5,
  ],
  [{ id: 'slices', given: { slices: 32 } }, '32'],
  [{ id: 'rate', given: { ...rate, rehearsal: true } }, 0.3],
  [{ id: 'bestOfDecoding', given: { best: -4.5, reads: 10, sense: 'min', rehearsal: true } }, '−4.5'],
  [{ id: 'r99', given: { p: 0.1, reads: 43.7087, rehearsal: false } }, '43.7'],
  [{ id: 'timeToSolution', given: { reads: 50, milliseconds: 2, isMeasured: true, rehearsal: false } }, '100\u202fms'],
  [{ id: 'effectiveTemperature', given: { temperature: 0.25, rows: 10, rowsInAll: 10, rehearsal: true } }, '0.25'],
  [{ id: 'gaugeTest', given: { of: 'energies', statistic: 40, degrees: 2, adjusted: 2e-9 } }, 'under 0.0001'],
  [{ id: 'scaleFall', given: { fall: 0.5, beta: 4, rehearsal: false } }, '0.5'],
  [{ id: 'bestCount', given: { best: 0, count: 3, reads: 10, rehearsal: true } }, '3'],
  [{ id: 'readsKept', given: { reads: 10, broken: 4, decoding: 'discard' } }, 6],
  [{ id: 'readsKept', given: { reads: 10, broken: 4, decoding: 'majority' } }, 10],
  [{ id: 'ties', given: { ties: 2 } }, '2'],
  [{ id: 'distance', given: { distance: 2 } }, '2'],
]

describe('explanations', () => {
  it('have an example of every kind here', () => {
    expect(HELP_IDS.filter((id) => !EXAMPLES.some(([request]) => request.id === id))).toEqual([])
  })

  it.each(EXAMPLES)('$id gives what plain arithmetic gives', (request, expected) => {
    const { steps, result } = explain(request)
    if (typeof expected === 'string') return expect(result).toBe(expected)
    const asked = steps.find(({ value }) => value === result)
    expect(asked?.values[0]).toBeCloseTo(expected, 12)
  })

  it.each(EXAMPLES)('$id lists every symbol of its formulas, and each once', (request) => {
    const { steps, inputs } = explain(request)
    const known = inputs.map(({ symbol }) => symbol)
    for (const { formula } of steps) {
      expect(symbolsOf(formula.expr).filter((symbol) => !known.includes(symbol))).toEqual([])
      known.push(formula.symbol)
    }
    expect(new Set(known).size).toBe(known.length)
  })

  it.each(EXAMPLES)('$id has a source, and says in words what has no formula', (request) => {
    const { steps, method, sources, result } = explain(request)
    expect(sources.length).toBeGreaterThan(0)
    expect(result).not.toBe('')
    if (steps.length === 0) expect(method).toMatch(/\.$/)
    for (const { spoken } of steps) expect(spoken).not.toMatch(/undefined|_/)
  })

  it('caution where a number is an estimate, a rehearsal’s, or no proof', () => {
    const cautionOf = (id: HelpRequest['id']) => explain(EXAMPLES.find(([request]) => request.id === id)![0]).caution
    expect(cautionOf('machineTime')).toContain('estimate')
    expect(cautionOf('rate')).toContain('classical stand-in')
    expect(cautionOf('energyOfState')).toContain('not proofs of optimality')
    expect(cautionOf('scale')).toContain('what the steward entered')
  })
})
