import type { OptimumMethodName } from '#shared/schemas/reference'
import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { minus, over, size } from './formula'
import { WILSON_STEPS, Z_95 } from './samples'
import type { Source } from './sources'
import { BERTELE_BRIOSCHI, DEFINITION, GLOVER_WOOLSEY, GRAY, KIRKPATRICK, OWN, WILSON } from './sources'
import { formatNumber, formatPercent, type NumberFormat } from '../format'

/** How the figures of a reference optimum are computed, and those of samples held against it. */

const METHODS: Record<OptimumMethodName, { words: string; source: Source }> = {
  enumeration: { words: 'every state was visited', source: GRAY },
  'tree decomposition': {
    words:
      'variables were minimised out one by one along a tree decomposition, each leaving a table over its neighbours (dynamic programming)',
    source: BERTELE_BRIOSCHI,
  },
  'integer programme': {
    words:
      'products were replaced by variables of their own and the linear programme in whole numbers was solved by HiGHS, beginning from the best state of annealing',
    source: GLOVER_WOOLSEY,
  },
  annealing: {
    words: 'simulated annealing with restarts, the best state kept',
    source: KIRKPATRICK,
  },
}

interface Value {
  energy: number
  proved: boolean
  tolerance: number
  methods: readonly OptimumMethodName[]
}

const methodsIn = (methods: readonly OptimumMethodName[]): string =>
  methods.length === 0
    ? 'No two variables interact, so each was set by the sign of its coefficient.'
    : `Components were solved apart: ${methods.map((method) => METHODS[method].words).join('; ')}.`

/** Reads that count as a success. */
interface Success {
  count: number
  total: number
  reference: number
  proved: boolean
  format: NumberFormat
  rehearsal: boolean
}

export const optimumHelp = {
  referenceValue: entry<Value>({
    inputs: ({ tolerance }) =>
      tolerance > 0 ? [{ symbol: 'τ', name: 'what rounding leaves open', value: tolerance }] : [],
    method: ({ methods }) =>
      `${methodsIn(methods)} The energy of the state was then summed anew, offset included, in the problem’s own sense.`,
    result: ({ energy }) => formatNumber(energy),
    sources: ({ methods }) => (methods.length === 0 ? [DEFINITION] : methods.map((method) => METHODS[method].source)),
    caution: ({ proved }) => (proved ? CAUTIONS.provedAsGiven : CAUTIONS.bestFound),
  }),
  referenceBound: entry<{ bound: number; sense: 'min' | 'max'; methods: readonly OptimumMethodName[] }>({
    inputs: () => [],
    method: ({ sense, methods }) =>
      `No state lies ${sense === 'min' ? 'below' : 'above'} it: the sum over components of the energy where it is proved, else of the better of two bounds: ${
        methods.includes('integer programme') ? 'that of the integer programme, and ' : ''
      }the least that each variable could add with half of each of its interactions. Where all energies are multiples of one step, it is moved to the next of them.`,
    result: ({ bound }) => formatNumber(bound),
    sources: () => [OWN],
  }),
  referenceGap: entry<{ energy: number; bound: number }>({
    inputs: ({ energy, bound }) => [
      { symbol: 'E', name: 'best energy', value: energy },
      { symbol: 'B', name: 'proved bound', value: bound },
    ],
    steps: () => [{ symbol: 'G', name: 'gap', expr: size(minus('E', 'B')) }],
    method: () => 'The optimum lies somewhere between the two.',
    sources: () => [DEFINITION],
  }),
  gapToReference: entry<{ best: number; reference: number; sense: 'min' | 'max'; proved: boolean }>({
    inputs: ({ best, reference }) => [
      { symbol: 'E', name: 'best energy of these samples', value: best },
      { symbol: 'R', name: 'reference optimum', value: reference },
    ],
    steps: ({ sense }) => [{ symbol: 'G', name: 'gap', expr: sense === 'min' ? minus('E', 'R') : minus('R', 'E') }],
    method: () => 'How much worse the best read is than the reference; below zero it is better.',
    sources: () => [DEFINITION],
    caution: ({ proved }) => (proved ? undefined : CAUTIONS.bestFound),
  }),
  successRate: entry<Success>({
    inputs: ({ count, total, reference }) => [
      { symbol: 'R', name: 'reference optimum', value: reference },
      { symbol: 'c', name: 'reads at the reference optimum or better', value: count },
      { symbol: 'N', name: 'reads kept', value: total },
      { symbol: 'z', name: 'quantile of the normal distribution for 95 %', value: Z_95 },
    ],
    steps: ({ format }) => [
      {
        symbol: 'p',
        name: 'success probability',
        isAsked: true,
        expr: over('c', 'N'),
        show: (value) => formatPercent(value, format),
      },
      ...WILSON_STEPS,
    ],
    method: () =>
      'A read is a success when its decoded energy reaches the reference optimum. The interval is Wilson’s.',
    sources: () => [WILSON],
    caution: ({ proved, rehearsal }) =>
      [proved ? '' : CAUTIONS.bestFound, rehearsal ? CAUTIONS.rehearsal : ''].filter(Boolean).join(' ') || undefined,
  }),
}
