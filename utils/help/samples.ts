import { CAUTIONS } from './cautions'
import { entry, type HelpStep } from './entry'
import { minus, over, plus, plusMinus, root, square, times } from './formula'
import { DEFINITION, WILSON } from './sources'
import { formatNumber, formatPercent, type NumberFormat } from '../format'

/** How the figures of returned samples are computed. */

/** Two-sided 95 % quantile of the standard normal distribution. */
export const Z_95 = 1.959964

interface Rate {
  count: number
  total: number
  /** What is counted: `reads with a broken chain`. */
  counted: string
  /** Of what: `reads`. */
  of: string
  format: NumberFormat
  rehearsal: boolean
}

/** Wilson’s interval of c counts in N trials, without a division by c so that 0 and N need no case of their own. */
export const WILSON_STEPS: readonly HelpStep[] = [
  {
    symbol: 'm',
    name: 'middle of the interval',
    expr: over(plus('c', over(square('z'), 2)), plus('N', square('z'))),
    show: (value) => formatPercent(value),
  },
  {
    symbol: 'w',
    name: 'half its width',
    expr: over(
      times('z', root(plus(over(times('c', minus('N', 'c')), 'N'), over(square('z'), 4)))),
      plus('N', square('z')),
    ),
    show: (value) => formatPercent(value),
  },
  { symbol: 'p_95', name: '95 % interval', expr: plusMinus('m', 'w'), show: (value) => formatPercent(value) },
]

const rehearsalCaution = ({ rehearsal }: { rehearsal: boolean }) => (rehearsal ? CAUTIONS.rehearsal : undefined)

export const samplesHelp = {
  rate: entry<Rate>({
    inputs: ({ count, total, counted, of }) => [
      { symbol: 'c', name: counted, value: count },
      { symbol: 'N', name: of, value: total },
      { symbol: 'z', name: 'quantile of the normal distribution for 95 %', value: Z_95 },
    ],
    steps: ({ format }) => [
      { symbol: 'p', name: 'rate', isAsked: true, expr: over('c', 'N'), show: (value) => formatPercent(value, format) },
      ...WILSON_STEPS,
    ],
    method: () => 'A chain is broken in a read when its qubits disagree. The interval is Wilson’s.',
    sources: () => [WILSON],
    caution: rehearsalCaution,
  }),
  bestOfDecoding: entry<{ best: number; reads: number; sense: 'min' | 'max'; rehearsal: boolean }>({
    inputs: ({ reads }) => [{ symbol: 'N', name: 'reads kept', value: reads, unit: 'reads' }],
    method: ({ sense }) =>
      `Each read kept is decoded to one value a variable and its energy worked out from the problem, offset included. This is the ${sense === 'min' ? 'lowest' : 'highest'} of them.`,
    result: ({ best }) => formatNumber(best),
    sources: () => [DEFINITION],
    caution: ({ rehearsal }) => (rehearsal ? `${CAUTIONS.samples} ${CAUTIONS.rehearsal}` : CAUTIONS.samples),
  }),
  bestCount: entry<{ best: number; count: number; reads: number; rehearsal: boolean }>({
    inputs: ({ best, reads }) => [
      { symbol: 'E', name: 'best energy', value: best },
      { symbol: 'N', name: 'reads kept', value: reads, unit: 'reads' },
    ],
    method: () => 'Reads that were decoded to exactly the best energy, whatever their assignment.',
    result: ({ count }) => formatNumber(count),
    sources: () => [DEFINITION],
    caution: ({ rehearsal }) => (rehearsal ? `${CAUTIONS.samples} ${CAUTIONS.rehearsal}` : CAUTIONS.samples),
  }),
  readsKept: entry<{ reads: number; broken: number; decoding: 'majority' | 'discard' | 'descent' }>({
    inputs: ({ reads, broken }) => [
      { symbol: 'N', name: 'reads', value: reads, unit: 'reads' },
      { symbol: 'B', name: 'reads with a broken chain', value: broken, unit: 'reads' },
    ],
    steps: ({ decoding }) => [
      { symbol: 'K', name: 'reads kept', expr: decoding === 'discard' ? minus('N', 'B') : 'N' },
    ],
    method: ({ decoding }) =>
      decoding === 'discard'
        ? 'Reads with any broken chain are left out.'
        : 'Broken chains are settled, so every read is kept.',
    sources: () => [DEFINITION],
  }),
  ties: entry<{ ties: number }>({
    inputs: () => [],
    method: () =>
      'Chains of an even number of qubits whose votes were equal, over all reads. Each is settled by a coin drawn from the run sheet’s seed.',
    result: ({ ties }) => formatNumber(ties),
    sources: () => [DEFINITION],
  }),
  distance: entry<{ distance: number }>({
    inputs: () => [],
    method: () => 'Variables whose value differs from the first row, counted.',
    result: ({ distance }) => formatNumber(distance),
    sources: () => [DEFINITION],
  }),
}
