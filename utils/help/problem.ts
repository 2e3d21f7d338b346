import type { StructureView } from '#shared/schemas/problems'
import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { greatest, minus, over, plus, sum, times } from './formula'
import { BODLAENDER_KOSTER, DEFINITION, LUCAS } from './sources'
import { formatNumber, formatPercent, formatSignificant, type NumberFormat } from '../format'

/** How the figures of a problem are computed. */

interface Size {
  variables: number
  interactions: number
}

const sizeInputs = ({ variables, interactions }: Size) => [
  { symbol: 'n', name: 'variables', value: variables },
  { symbol: 'm', name: 'interactions', value: interactions },
]

const ofDegrees = (histogram: StructureView['degreeHistogram']) =>
  histogram.map(({ value, count }) => `${formatNumber(value)}\u00a0(${formatNumber(count)})`).join(', ')

export const problemHelp = {
  density: entry<Size>({
    inputs: sizeInputs,
    steps: () => [
      {
        symbol: 'ρ',
        name: 'density',
        expr: over('m', over(times('n', minus('n', 1)), 2)),
        show: (value) => formatPercent(value),
      },
    ],
    method: () => 'The share of all pairs of variables that interact.',
    sources: () => [DEFINITION],
  }),
  meanDegree: entry<Size & { format: NumberFormat }>({
    inputs: sizeInputs,
    steps: ({ format }) => [
      {
        symbol: 'd',
        name: 'mean degree',
        expr: over(times(2, 'm'), 'n'),
        show: (value) => formatNumber(value, format),
      },
    ],
    method: () => 'Each interaction counts at both of its variables.',
    sources: () => [DEFINITION],
  }),
  degrees: entry<Size & { degrees: StructureView['degreeHistogram'] }>({
    inputs: ({ degrees, ...sizes }) => [
      ...sizeInputs(sizes),
      {
        symbol: 'd_i',
        name: 'interactions of a variable (and how many variables have so many)',
        value: degrees.map(({ value }) => value),
        text: ofDegrees(degrees),
      },
    ],
    steps: () => [
      { symbol: 'D', name: 'highest degree', isAsked: true, expr: greatest('i', 'd_i') },
      { symbol: 'd', name: 'mean degree', expr: over(times(2, 'm'), 'n'), show: formatSignificant },
    ],
    method: () => 'The degree of a variable is the number of its interactions; each interaction counts at both ends.',
    sources: () => [DEFINITION],
  }),
  dynamicRange: entry<{ value: number; sizes: StructureView['coefficientSizes'] }>({
    inputs: ({ sizes }) =>
      sizes
        ? [
            { symbol: 'c_max', name: 'largest size of a coefficient', value: sizes.greatest },
            { symbol: 'c_min', name: 'smallest size that is not zero', value: sizes.least },
          ]
        : [],
    steps: ({ sizes }) =>
      sizes
        ? [
            {
              symbol: 'R',
              name: 'dynamic range',
              expr: over('c_max', 'c_min'),
              show: (value) => formatSignificant(value, 4),
            },
          ]
        : [],
    method: () =>
      'Over linear coefficients and interactions in the form the problem was given in, the offset left out. A wide range drowns the smallest coefficients in control error.',
    result: ({ value }) => formatSignificant(value, 4),
    sources: () => [DEFINITION],
  }),
  components: entry<Size & { components: number }>({
    inputs: sizeInputs,
    method: () =>
      'Variables that are joined by a path of interactions belong to one component; a variable without interactions is one of its own. Components can be solved apart.',
    result: ({ components }) => formatNumber(components),
    sources: () => [DEFINITION],
  }),
  isolated: entry<{ degrees: StructureView['degreeHistogram']; isolated: number }>({
    inputs: ({ degrees }) => [
      {
        symbol: 'd_i',
        name: 'interactions of a variable (and how many variables have so many)',
        value: degrees.map(({ value }) => value),
        text: ofDegrees(degrees),
      },
    ],
    method: () =>
      'Variables with no interaction. Each needs one qubit and can be fixed by the sign of its coefficient.',
    result: ({ isolated }) => formatNumber(isolated),
    sources: () => [DEFINITION],
  }),
  problemTreewidth: entry<Size & { bound: number }>({
    inputs: sizeInputs,
    method: () =>
      'Variables are taken out one by one, always one whose neighbours lack the fewest interactions among themselves; its neighbours are then joined. The bound is the most neighbours that a variable has when its turn comes.',
    result: ({ bound }) => `≤ ${formatNumber(bound)}`,
    sources: () => [BODLAENDER_KOSTER],
    caution: () => 'An upper bound: the treewidth itself may be smaller. It is left out for large problems.',
  }),
  coupling: entry<{ form: 'qubo' | 'ising'; value: number }>({
    inputs: ({ form, value }) => [
      { symbol: form === 'qubo' ? 'b_ij' : 'J_ij', name: `the pair’s ${form === 'qubo' ? 'b' : 'J'}, as given`, value },
    ],
    steps: ({ form }) => [
      form === 'qubo'
        ? { symbol: 'J_ij', name: 'J of the pair', expr: over('b_ij', 4) }
        : { symbol: 'b_ij', name: 'b of the pair', expr: times(4, 'J_ij') },
    ],
    method: ({ form }) =>
      form === 'qubo'
        ? 'With s = 2x − 1. Likewise h_i = a_i/2 + Σ_j b_ij/4 for every variable, and g = c + Σ a_i/2 + Σ b_ij/4 for the offset.'
        : 'With x = (s + 1)/2. Likewise a_i = 2h_i − 2 Σ_j J_ij for every variable, and c = g − Σ h_i + Σ J_ij for the offset.',
    sources: () => [LUCAS],
  }),
  bestOfProblem: entry<{ best: number; sense: 'min' | 'max' }>({
    inputs: () => [],
    method: ({ sense }) =>
      `The ${sense === 'min' ? 'lowest' : 'highest'} logical energy, offset included, over all reads of all samples of this problem so far, each chain decoded by the majority of its qubits.`,
    result: ({ best }) => formatNumber(best),
    sources: () => [DEFINITION],
    caution: () => CAUTIONS.samples,
  }),
  energyOfState: entry<{ linear: number; interactions: number; offset: number; rehearsal: boolean }>({
    inputs: ({ linear, interactions, offset }) => [
      { symbol: 'H', name: 'sum of h s over the variables', value: linear },
      { symbol: 'C', name: 'sum of J s s over the interactions', value: interactions },
      { symbol: 'g', name: 'offset', value: offset },
    ],
    steps: () => [{ symbol: 'E', name: 'energy', expr: plus('H', 'C', 'g') }],
    method: () =>
      'The Ising form at the decoded spins s = ±1, in the problem’s own sense. Both forms give the same energy state by state.',
    sources: () => [LUCAS],
    caution: ({ rehearsal }) => (rehearsal ? `${CAUTIONS.samples} ${CAUTIONS.rehearsal}` : CAUTIONS.samples),
  }),
  meanEnergy: entry<{ total: number; reads: number }>({
    inputs: ({ total, reads }) => [
      { symbol: 'S', name: 'sum of the energies of all reads kept', value: total },
      { symbol: 'N', name: 'reads kept', value: reads, unit: 'reads' },
    ],
    steps: () => [
      {
        symbol: 'E',
        name: 'mean energy',
        expr: over('S', 'N'),
        show: (value) => formatNumber(value, { significant: 4 }),
      },
    ],
    sources: () => [DEFINITION],
  }),
  medianEnergy: entry<{ median: number; reads: number }>({
    inputs: ({ reads }) => [{ symbol: 'N', name: 'reads kept', value: reads, unit: 'reads' }],
    method: () =>
      'Reads in order of their energy: the energy of the first at which half of them are reached. Of an even number the lower of the middle two.',
    result: ({ median }) => formatNumber(median),
    sources: () => [DEFINITION],
  }),
  energyBars: entry<{ counts: readonly number[]; width: number }>({
    inputs: ({ counts }) => [{ symbol: 'N_k', name: 'reads in each bar', value: counts, unit: 'reads' }],
    steps: () => [{ symbol: 'N', name: 'reads kept', expr: sum('k', 'N_k') }],
    method: ({ width }) =>
      `Each bar counts reads whose energy lies in a step of ${formatNumber(width)}, its lower end included. Steps are 1, 2 or 5 times a power of ten.`,
    sources: () => [DEFINITION],
  }),
}
