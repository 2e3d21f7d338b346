import type { RunSheetView, Strength } from '#shared/schemas/run-sheets'
import { CAUTIONS } from './cautions'
import { entry, type HelpInput, type HelpStep } from './entry'
import { least, most, over, plus, root, size, square, times, minus } from './formula'
import { CHOI_2008, DEFINITION, KING_MCGEOCH, MACHINE_SHEET, OWN, VENTURELLI } from './sources'
import { formatNumber, formatPercent, formatSignificant } from '../format'

/** How chain strengths, scale, precision and machine time are computed. */

export type IsingSizes = RunSheetView['ising']
export type ScaleLimit = NonNullable<RunSheetView['scaleLimit']>

interface RuleGiven {
  rule: Exclude<Strength['rule'], 'manual'>
  /** What the rule is multiplied by. */
  value: number
  ising: IsingSizes
  /** The chain, for rules that give every chain its own strength. */
  chain?: { label: string; pull: number; field: number; cutBound: number }
}

const inUnitsOfJ = 'in units of J'
const K_DIGITS = (value: number): string => formatSignificant(value, 4)

/** The largest |J|, or the largest |h| of a problem without interactions. */
const reference = ({ interactions, greatestJ, greatestH }: IsingSizes): HelpInput =>
  interactions > 0
    ? { symbol: 'J_max', name: 'largest |J| of the Ising form', value: greatestJ }
    : { symbol: 'J_max', name: 'largest |h|, as there is no interaction', value: greatestH }

function strengthInputs({ rule, value, ising, chain }: RuleGiven): HelpInput[] {
  switch (rule) {
    case 'fixed':
      return [{ symbol: 'c', name: 'multiple', value, from: 'run sheet' }, reference(ising)]
    case 'rms':
      if (ising.interactions === 0) return [{ symbol: 'κ', name: 'factor', value, from: 'run sheet' }, reference(ising)]
      return [
        { symbol: 'κ', name: 'factor', value, from: 'run sheet' },
        { symbol: 'J_rms', name: 'root mean square of J over the interactions', value: ising.rmsJ },
        { symbol: 'm', name: 'interactions', value: ising.interactions },
        { symbol: 'n', name: 'variables', value: ising.variables },
      ]
    case 'choi':
      return [
        { symbol: 'X', name: 'sum of |J| over the interactions of the variable', value: chain?.pull ?? 0 },
        { symbol: 'h', name: 'field of the variable', value: chain?.field ?? 0 },
        ...marginInputs(value, ising),
      ]
    case 'cut':
      return [
        { symbol: 'b', name: 'cut bound of the chain', value: chain?.cutBound ?? 0 },
        ...marginInputs(value, ising),
      ]
  }
}

const marginInputs = (value: number, ising: IsingSizes): HelpInput[] => [
  { symbol: 'μ', name: 'margin', value, from: 'run sheet' },
  { symbol: 's', name: 'least share', value: ising.leastShare },
  reference(ising),
]

const strength = (expr: HelpStep['expr']): HelpStep => ({
  symbol: 'k',
  name: 'chain strength',
  unit: inUnitsOfJ,
  expr,
  show: K_DIGITS,
})
const withMargin = strength(most(times('μ', 'b'), times('s', 'J_max')))

const STRENGTH_STEPS: Record<RuleGiven['rule'], readonly HelpStep[]> = {
  fixed: [strength(times('c', 'J_max'))],
  rms: [{ symbol: 'd', name: 'mean degree', expr: over(times(2, 'm'), 'n') }, strength(times('κ', 'J_rms', root('d')))],
  choi: [{ symbol: 'b', name: 'Choi’s bound', expr: most(0, minus('X', size('h'))), show: K_DIGITS }, withMargin],
  cut: [withMargin],
}

const STRENGTH_WORDS: Record<RuleGiven['rule'], string> = {
  fixed: 'One strength for all chains. The multiple is yours; 1.25 where none is given.',
  rms: 'One strength for all chains. Neighbours pull on a chain at random, so their sum grows with the root of their number; the scaling was measured on fully connected spin glasses.',
  choi: 'Every chain has its own. Above the bound no ground state breaks the chain, when its field is shared by external coupling or is zero.',
  cut: 'Every chain has its own. Above the bound no ground state breaks the chain, however fields and couplings were shared.',
}
const STRENGTH_CAUTIONS: Record<RuleGiven['rule'], string> = {
  fixed: 'A rule of thumb: rehearse before you settle it.',
  rms: 'κ = 1 is not yet calibrated: rehearse before you settle it.',
  choi: `With an even split of a field it can ask for too little. ${CAUTIONS.sufficient}`,
  cut: CAUTIONS.sufficient,
}
const STRENGTH_SOURCES = { fixed: OWN, rms: VENTURELLI, choi: CHOI_2008, cut: OWN }

interface TimeGiven {
  gauges: number
  reads: number
  anneal: number
  timing: RunSheetView['machineTime']['timing']
}

const µs = 'µs'
const timeInputs = ({ gauges, reads, anneal, timing }: TimeGiven): HelpInput[] => [
  { symbol: 'G', name: 'gauges, each programmed once', value: gauges, from: 'run sheet' },
  { symbol: 'R', name: 'reads over all gauges', value: reads, unit: 'reads', from: 'run sheet' },
  { symbol: 't_a', name: 'anneal', value: anneal, unit: µs, from: 'run sheet' },
  { symbol: 't_p', name: 'programming', value: timing.programmingMicroseconds, unit: µs, from: 'machine sheet' },
  { symbol: 't_r', name: 'read-out', value: timing.readoutMicroseconds, unit: µs, from: 'machine sheet' },
  { symbol: 't_d', name: 'delay', value: timing.delayMicroseconds, unit: µs, from: 'machine sheet' },
]

export const programmingHelp = {
  strength: entry<RuleGiven>({
    inputs: strengthInputs,
    steps: ({ rule, ising }) =>
      rule === 'rms' && ising.interactions === 0 ? [strength(times('κ', 'J_max'))] : STRENGTH_STEPS[rule],
    method: ({ rule }) => STRENGTH_WORDS[rule],
    unit: () => inUnitsOfJ,
    sources: ({ rule }) => [STRENGTH_SOURCES[rule]],
    caution: ({ rule }) => STRENGTH_CAUTIONS[rule],
  }),
  strengthEntered: entry<{ text: string }>({
    inputs: () => [],
    method: () => 'Not computed: entered on the run sheet, for all chains or for named ones.',
    result: ({ text }) => text,
    unit: () => inUnitsOfJ,
    sources: () => [DEFINITION],
  }),
  scale: entry<{ limit: ScaleLimit | null }>({
    inputs: ({ limit }) =>
      limit
        ? [
            {
              symbol: 'r',
              name: `end of the machine’s range of ${limit.range}`,
              value: limit.limit,
              from: 'machine sheet',
            },
            { symbol: 'v', name: `${limit.range} that goes furthest beyond it, before scaling`, value: limit.value },
          ]
        : [],
    steps: ({ limit }) => [
      {
        symbol: 'α',
        name: 'scale',
        expr: limit ? least(1, over('r', 'v')) : 1,
        show: (value) => formatSignificant(value),
      },
    ],
    method: ({ limit }) =>
      limit
        ? 'One factor for all programmed values: the largest, at most 1, at which every h, every J and every sum of couplings at a qubit lies in the machine’s ranges. The value that asks for the smallest factor decides.'
        : 'Every h, every J and every sum of couplings at a qubit lies in the machine’s ranges as it is, so nothing is scaled.',
    sources: () => [OWN, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  underTwoSigma: entry<{ under: number; total: number; sigma: number; what: 'couplings' | 'fields' }>({
    inputs: ({ under, total, sigma, what }) => [
      { symbol: 'σ', name: `control error of ${what === 'fields' ? 'h' : 'J'}`, value: sigma, from: 'machine sheet' },
      { symbol: 'u', name: `programmed ${what} of a size under 2σ = ${formatNumber(2 * sigma)}`, value: under },
      {
        symbol: 'N',
        name: what === 'fields' ? 'programmed fields that are not zero' : 'programmed couplings between chains',
        value: total,
      },
    ],
    steps: () => [
      {
        symbol: 'p',
        name: 'share under 2σ',
        expr: over('u', 'N'),
        show: (value) => formatPercent(value, { significant: 2 }),
      },
    ],
    method: () => 'Control error is taken as Gaussian: a value smaller than two standard deviations drowns in it.',
    sources: () => [KING_MCGEOCH, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  chainsBelowBound: entry<{ below: number; chains: number }>({
    inputs: ({ chains }) => [{ symbol: 'n', name: 'chains', value: chains }],
    method: () =>
      'Chains of two or more qubits whose strength k is smaller than their cut bound, counted. The bound of each is under “k and bound of every chain”.',
    result: ({ below, chains }) => `${below} of ${chains}`,
    sources: () => [OWN],
    caution: () => CAUTIONS.sufficient,
  }),
  energyNoise: entry<{ qubits: number; couplers: number; sigmaH: number; sigmaJ: number; scale: number }>({
    inputs: ({ qubits, couplers, sigmaH, sigmaJ, scale }) => [
      { symbol: 'U', name: 'qubits used', value: qubits, unit: 'qubits' },
      { symbol: 'C', name: 'couplers used between chains', value: couplers },
      { symbol: 'σ_h', name: 'control error of h', value: sigmaH, from: 'machine sheet' },
      { symbol: 'σ_J', name: 'control error of J', value: sigmaJ, from: 'machine sheet' },
      { symbol: 'α', name: 'scale', value: scale },
    ],
    steps: () => [
      {
        symbol: 'δ',
        name: 'energy noise, one standard deviation',
        unit: 'in units of the problem',
        expr: over(root(plus(times('U', square('σ_h')), times('C', square('σ_J')))), 'α'),
        show: (value) => formatSignificant(value, 3),
      },
    ],
    method: () =>
      'Independent Gaussian errors on every programmed value. Those of couplers inside chains are common to all unbroken states and leave their order alone.',
    unit: () => 'in units of the problem',
    sources: () => [KING_MCGEOCH, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  cutBound: entry<{ up: number; down: number; cut: number; exact: boolean }>({
    inputs: ({ up, down, cut }) => [
      { symbol: 'a', name: 'external coupling less field, over one side', value: up },
      { symbol: 'b', name: 'external coupling plus field, over the other', value: down },
      { symbol: 'c', name: 'chain couplers cut between the two', value: cut },
    ],
    steps: () => [
      {
        symbol: 'B',
        name: 'cut bound',
        unit: inUnitsOfJ,
        expr: most(0, over(least('a', 'b'), 'c')),
        show: K_DIGITS,
      },
    ],
    method: ({ exact }) =>
      exact
        ? 'Of all ways to split the chain in two, the one that asks for the strongest chain, with one side up and the other down. Listed are the sums of that split.'
        : 'A safe upper bound, as the chain has cycles and is too long to try every split: cuts of a spanning tree, fields that would help left out.',
    unit: () => inUnitsOfJ,
    sources: () => [OWN, CHOI_2008],
    caution: () => CAUTIONS.sufficient,
  }),
  strengthOverBound: entry<{ strength: number; bound: number }>({
    inputs: ({ strength: k, bound }) => [
      { symbol: 'k', name: 'chain strength', value: k, unit: inUnitsOfJ },
      { symbol: 'B', name: 'cut bound', value: bound, unit: inUnitsOfJ },
    ],
    steps: () => [
      { symbol: 'q', name: 'strength over bound', expr: over('k', 'B'), show: (value) => formatSignificant(value, 3) },
    ],
    sources: () => [OWN],
    caution: () => CAUTIONS.sufficient,
  }),
  machineTime: entry<TimeGiven & { show: (milliseconds: number) => string; unit: string }>({
    inputs: timeInputs,
    steps: ({ show, unit }) => [
      {
        symbol: 'T',
        name: 'machine time in milliseconds',
        unit,
        expr: over(plus(times('G', 't_p'), times('R', plus('t_a', 't_r', 't_d'))), 1000),
        show,
      },
    ],
    sources: () => [MACHINE_SHEET],
    caution: () => `${CAUTIONS.estimate} ${CAUTIONS.sheet}`,
  }),
  load: entry<{ what: string; value: number; limit: number; show: (share: number) => string }>({
    inputs: ({ what, value, limit }) => [
      { symbol: 'v', name: `largest ${what} on the chain, as programmed`, value },
      { symbol: 'r', name: 'end of the machine’s range on its side', value: limit, from: 'machine sheet' },
    ],
    steps: ({ show }) => [{ symbol: 'f', name: 'share of the range', expr: over('v', 'r'), show }],
    sources: () => [MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
}
