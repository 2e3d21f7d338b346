import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { greatest, minus, over, sum, times } from './formula'
import { CAI, DEFINITION, OWN } from './sources'
import { formatNumber, formatPercent, type NumberFormat } from '../format'

/** How the figures of an embedding are computed. */

/** lengthHistogram[l] is the number of chains of l qubits. */
interface Lengths {
  histogram: readonly number[]
}

const occurring = ({ histogram }: Lengths) =>
  histogram.flatMap((chains, length) => (chains > 0 ? [{ length, chains }] : []))

const lengthInputs = (lengths: Lengths) => [
  {
    symbol: 'L_k',
    name: 'lengths that occur',
    value: occurring(lengths).map(({ length }) => length),
    unit: 'qubits',
  },
  { symbol: 'N_k', name: 'chains of each length', value: occurring(lengths).map(({ chains }) => chains) },
]

/** Qubits by how many chains want them: uses[u] qubits lie on u chains. */
const shared = (uses: readonly number[]) => uses.flatMap((qubits, u) => (u > 1 && qubits > 0 ? [{ u, qubits }] : []))

export const embeddingHelp = {
  longestChain: entry<Lengths>({
    inputs: lengthInputs,
    steps: () => [{ symbol: 'L', name: 'longest chain', unit: 'qubits', expr: greatest('k', 'L_k') }],
    method: () => 'The length of a chain is its number of qubits.',
    unit: () => 'qubits',
    sources: () => [DEFINITION],
    caution: () => 'The shortest chains found need not be the shortest there are.',
  }),
  meanLength: entry<Lengths>({
    inputs: lengthInputs,
    steps: () => [
      { symbol: 'U', name: 'qubits used', unit: 'qubits', expr: sum('k', times('L_k', 'N_k')) },
      { symbol: 'n', name: 'chains', expr: sum('k', 'N_k') },
      {
        symbol: 'ℓ',
        name: 'mean length',
        unit: 'qubits',
        expr: over('U', 'n'),
        show: (value) => formatNumber(value, { decimals: 2 }),
      },
    ],
    sources: () => [DEFINITION],
  }),
  qubitsUsed: entry<Lengths & { working: number }>({
    inputs: ({ working, ...lengths }) => [
      ...lengthInputs(lengths),
      { symbol: 'q', name: 'working qubits of the machine', value: working, unit: 'qubits' },
    ],
    steps: () => [
      {
        symbol: 'U',
        name: 'qubits used',
        unit: 'qubits',
        isAsked: true,
        expr: sum('k', times('L_k', 'N_k')),
      },
      {
        symbol: 'f',
        name: 'share left free',
        expr: minus(1, over('U', 'q')),
        show: (value) => formatPercent(value),
      },
    ],
    method: () => 'The sum of the lengths of all chains: chains of a valid embedding share no qubit.',
    sources: () => [DEFINITION],
  }),
  unusedShare: entry<{ used: number; working: number; format: NumberFormat }>({
    inputs: ({ used, working }) => [
      { symbol: 'U', name: 'qubits used', value: used, unit: 'qubits' },
      { symbol: 'q', name: 'working qubits of the machine', value: working, unit: 'qubits' },
    ],
    steps: ({ format }) => [
      {
        symbol: 'f',
        name: 'share left free',
        expr: minus(1, over('U', 'q')),
        show: (value) => formatPercent(value, format),
      },
    ],
    sources: () => [DEFINITION],
  }),
  meanOfTotals: entry<{ used: number; chains: number }>({
    inputs: ({ used, chains }) => [
      { symbol: 'U', name: 'qubits used', value: used, unit: 'qubits' },
      { symbol: 'n', name: 'chains, one for each variable', value: chains },
    ],
    steps: () => [
      {
        symbol: 'ℓ',
        name: 'mean length',
        unit: 'qubits',
        expr: over('U', 'n'),
        show: (value) => formatNumber(value, { decimals: 2 }),
      },
    ],
    sources: () => [DEFINITION],
  }),
  chainCouplers: entry<{ couplers: number; used: number; chains: number }>({
    inputs: ({ used, chains }) => [
      { symbol: 'U', name: 'qubits used', value: used, unit: 'qubits' },
      { symbol: 'n', name: 'chains', value: chains },
    ],
    method: ({ used, chains }) =>
      `Working couplers with both ends in one chain, counted over all chains. Chains that are trees would have U − n = ${formatNumber(used - chains)}; what is beyond that closes cycles.`,
    result: ({ couplers }) => formatNumber(couplers),
    sources: () => [DEFINITION],
  }),
  interactionCouplers: entry<{ couplers: number; interactions: number }>({
    inputs: ({ interactions }) => [{ symbol: 'm', name: 'interactions of the problem', value: interactions }],
    method: () =>
      'Working couplers between the chains of two variables that interact, counted over all interactions. Each needs at least one; where there are several, J is shared over them.',
    result: ({ couplers }) => formatNumber(couplers),
    sources: () => [DEFINITION],
  }),
  overlap: entry<{ uses: readonly number[]; overlap: number }>({
    inputs: ({ uses }) => [
      { symbol: 'u_k', name: 'numbers of chains on one qubit', value: shared(uses).map(({ u }) => u) },
      { symbol: 'Q_k', name: 'qubits with so many', value: shared(uses).map(({ qubits }) => qubits), unit: 'qubits' },
    ],
    steps: ({ uses }) =>
      shared(uses).length ? [{ symbol: 'O', name: 'overlap', expr: sum('k', times('Q_k', minus('u_k', 1))) }] : [],
    method: () => 'Every chain on a qubit beyond the first counts once. An embedding is valid when it is 0.',
    result: ({ overlap }) => formatNumber(overlap),
    sources: () => [CAI],
    caution: () => CAUTIONS.noneFound,
  }),
  unmetInteractions: entry<{ unmet: number }>({
    inputs: () => [],
    method: () => 'Interactions whose two chains share no working coupler, in the closest state of the search.',
    result: ({ unmet }) => formatNumber(unmet),
    sources: () => [DEFINITION],
  }),
  neededQubits: entry<{ needed: number; working: number }>({
    inputs: ({ working }) => [{ symbol: 'q', name: 'working qubits of the machine', value: working, unit: 'qubits' }],
    method: () =>
      'The qubits of all chains in the closest state of the search, shared ones counted for each; a variable without a chain counts as the mean of the others.',
    result: ({ needed }) => formatNumber(needed),
    sources: () => [OWN],
    caution: () => 'An estimate from one state: it does not say that an embedding exists on more qubits.',
  }),
}
