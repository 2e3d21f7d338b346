import type { Family } from '#shared/engine/machine/fabric'
import { GIGAHERTZ_PER_KELVIN } from '#shared/engine/machine/energy-units'
import { CAUTIONS } from './cautions'
import { entry, type HelpInput } from './entry'
import type { Expr } from './formula'
import { minus, over, plus, square, times } from './formula'
import {
  BENJAMINI_HOCHBERG,
  BODLAENDER_KOSTER,
  BOOTHBY_2016,
  CHOI_2011,
  CODATA,
  DEFINITION,
  GILBERT,
  HEAVY_HEX,
  MACHINE_SHEET,
  MANTEL_HAENSZEL,
  OWN,
  PEGASUS,
  ZEPHYR,
} from './sources'
import { formatNumber, formatPercent } from '../format'

/** How the figures of a machine are computed. */

interface Count {
  expr: Expr
  inputs: HelpInput[]
}

const size = (symbol: string, name: string, value: number): HelpInput => ({ symbol, name, value })

function qubitsOf(family: Family): Count {
  switch (family.kind) {
    case 'chimera':
      return {
        expr: times(2, 'm', 'n', 't'),
        inputs: [
          size('m', 'rows of cells', family.m),
          size('n', 'columns', family.n),
          size('t', 'half a cell', family.t),
        ],
      }
    case 'pegasus':
      return {
        expr: family.trimmed ? times(8, minus(times(3, 'm'), 1), minus('m', 1)) : times(24, 'm', minus('m', 1)),
        inputs: [size('m', family.trimmed ? 'size, trimmed fabric' : 'size, untrimmed fabric', family.m)],
      }
    case 'zephyr':
      return {
        expr: times(4, 't', 'm', plus(times(2, 'm'), 1)),
        inputs: [size('m', 'size', family.m), size('t', 'tile', family.t)],
      }
    case 'cubic':
      return { expr: times('W', 'H', 'D'), inputs: boxInputs(family) }
    case 'heavy-hex':
      return {
        expr: minus(plus(times(5, 'r', 'c'), times(4, 'r'), times(4, 'c')), 1),
        inputs: [size('r', 'rows', family.rows), size('c', 'columns', family.columns)],
      }
    case 'custom':
      return { expr: 'N', inputs: [{ ...size('N', 'qubits in the file', family.qubits), from: family.file }] }
    default:
      return { expr: times('W', 'H'), inputs: boardInputs(family) }
  }
}

const boardInputs = ({ width, height }: Extract<Family, { kind: 'king' | 'square' }>): HelpInput[] => [
  size('W', 'width', width),
  size('H', 'height', height),
]

const boxInputs = ({ width, height, depth }: Extract<Family, { kind: 'cubic' }>): HelpInput[] => [
  size('W', 'width', width),
  size('H', 'height', height),
  size('D', 'depth', depth),
]

/** Closed forms of the number of couplers, where there are some. */
function couplersOf(family: Family): Count | null {
  switch (family.kind) {
    case 'chimera':
      return {
        expr: plus(times('m', 'n', square('t')), times('t', 'n', minus('m', 1)), times('t', 'm', minus('n', 1))),
        inputs: qubitsOf(family).inputs,
      }
    case 'king':
      return {
        expr: plus(minus(times(4, 'W', 'H'), times(3, plus('W', 'H'))), 2),
        inputs: boardInputs(family),
      }
    case 'square':
      return { expr: minus(minus(times(2, 'W', 'H'), 'W'), 'H'), inputs: boardInputs(family) }
    case 'cubic':
      return {
        expr: minus(minus(minus(times(3, 'W', 'H', 'D'), times('W', 'H')), times('W', 'D')), times('H', 'D')),
        inputs: boxInputs(family),
      }
    case 'heavy-hex':
      return {
        expr: minus(plus(times(6, 'r', 'c'), times(4, 'r'), times(4, 'c')), 2),
        inputs: qubitsOf(family).inputs,
      }
    default:
      return null
  }
}

const FAMILY_SOURCE = {
  pegasus: PEGASUS,
  zephyr: ZEPHYR,
  chimera: BOOTHBY_2016,
  king: DEFINITION,
  square: DEFINITION,
  cubic: DEFINITION,
  'heavy-hex': HEAVY_HEX,
  custom: DEFINITION,
}

export const machineHelp = {
  workingQubits: entry<{ family: Family; missing: number }>({
    inputs: ({ family, missing }) => [
      ...qubitsOf(family).inputs,
      { symbol: 'x', name: 'missing qubits', value: missing, from: 'machine sheet' },
    ],
    steps: ({ family }) => [
      { symbol: 'Q', name: 'qubits made', expr: qubitsOf(family).expr },
      { symbol: 'q', name: 'working qubits', expr: minus('Q', 'x') },
    ],
    sources: ({ family }) => [FAMILY_SOURCE[family.kind], MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  qubitsMade: entry<{ family: Family }>({
    inputs: ({ family }) => qubitsOf(family).inputs,
    steps: ({ family }) => [{ symbol: 'Q', name: 'qubits made', expr: qubitsOf(family).expr }],
    sources: ({ family }) => [FAMILY_SOURCE[family.kind]],
  }),
  couplersMade: entry<{ family: Family; couplers: number }>({
    inputs: ({ family }) => couplersOf(family)?.inputs ?? qubitsOf(family).inputs,
    steps: ({ family }) => {
      const count = couplersOf(family)
      return count ? [{ symbol: 'E', name: 'couplers made', expr: count.expr }] : []
    },
    method: ({ family }) => (couplersOf(family) ? '' : family.kind === 'custom' ? COUNTED_IN_FILE : COUNTED),
    result: ({ couplers }) => formatNumber(couplers),
    sources: ({ family }) => [FAMILY_SOURCE[family.kind]],
  }),
  workingCouplers: entry<{ made: number; working: number }>({
    inputs: ({ made, working }) => [
      { symbol: 'E', name: 'couplers made', value: made },
      {
        symbol: 'x',
        name: 'missing: listed, or at a missing qubit',
        value: made - working,
        from: 'machine sheet',
      },
    ],
    steps: () => [{ symbol: 'e', name: 'working couplers', expr: minus('E', 'x') }],
    sources: () => [MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  machineDegree: entry<{ degree: number; qubits: number; couplers: number }>({
    inputs: ({ qubits, couplers }) => [
      { symbol: 'q', name: 'working qubits', value: qubits },
      { symbol: 'e', name: 'working couplers', value: couplers },
    ],
    method: () => 'The most working couplers at one working qubit, counted over the whole machine.',
    result: ({ degree }) => formatNumber(degree),
    sources: () => [DEFINITION],
  }),
  range: entry<{ what: 'h' | 'J' | 'coupling sum'; text: string; calibration: number }>({
    inputs: () => [],
    method: ({ what, calibration }) =>
      `Not computed: entered with calibration ${calibration}. ${RANGE_RULE[what]} The scale α shrinks all programmed values alike until every one fits.`,
    result: ({ text }) => text,
    sources: () => [MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  thermalEnergy: entry<{ millikelvin: number }>({
    inputs: ({ millikelvin }) => [
      { symbol: 'T', name: 'temperature of the chip', value: millikelvin / 1000, unit: 'K', from: 'machine sheet' },
      {
        symbol: 'c',
        name: 'Boltzmann constant over Planck constant',
        value: GIGAHERTZ_PER_KELVIN,
        text: '20.8366',
        unit: 'GHz/K',
      },
    ],
    steps: () => [
      {
        symbol: 'E',
        name: 'thermal energy as a frequency',
        expr: times('c', 'T'),
        unit: 'GHz',
        show: (value) => formatNumber(value, { significant: 4 }),
      },
    ],
    method: () =>
      'A level that lies several times kT above the lowest is hardly occupied by warmth alone. B(1)/2 is the energy of a programmed coupling or field of 1 at the end of the anneal.',
    sources: () => [CODATA, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  capacityBound: entry<{ treewidth: number }>({
    inputs: ({ treewidth }) => [{ symbol: 'w', name: 'upper bound of the machine’s treewidth', value: treewidth }],
    steps: () => [
      { symbol: 'n', name: 'variables of the largest complete graph that is not ruled out', expr: plus('w', 1) },
    ],
    method: () =>
      'Treewidth never grows by contracting and deleting, so a problem that can be embedded has at most the machine’s; a complete graph of n variables has treewidth n − 1. The machine’s bound is the smallest width of several elimination orders: sweeps over its lines from each side, breadth first from far to near, and least fill on small machines. Missing qubits and couplers are left out.',
    sources: () => [BODLAENDER_KOSTER, GILBERT],
  }),
  capacityTreewidth: entry<{ treewidth: number; qubits: number; couplers: number }>({
    inputs: ({ qubits, couplers }) => [
      { symbol: 'q', name: 'working qubits', value: qubits },
      { symbol: 'e', name: 'working couplers', value: couplers },
    ],
    method: () =>
      'Qubits are taken out in an order, the remaining neighbours of each being joined; the width is the most neighbours that a qubit has when its turn comes. The smallest width over several orders is kept.',
    result: ({ treewidth }) => formatNumber(treewidth),
    sources: () => [BODLAENDER_KOSTER, GILBERT],
    caution: () => 'An upper bound: the treewidth itself may be smaller.',
  }),
  completeByTemplate: entry<{ order: number; chainLength: number; seed: number; tries: number }>({
    inputs: ({ seed, tries, chainLength }) => [
      { symbol: 'L', name: 'qubits of its longest chain', value: chainLength, unit: 'qubits' },
      { symbol: 'T', name: 'tries', value: tries },
      { symbol: 's', name: 'seed', value: seed },
    ],
    method: () =>
      'Every chain is a vertical and a horizontal run of working qubits that meet pairwise below a diagonal; on square windows of the machine, seen from each corner, the largest such set is kept, and up to three more chains grow through what is left free.',
    result: ({ order }) => formatNumber(order),
    sources: () => [CHOI_2011, BOOTHBY_2016],
    caution: () => CAUTIONS.noneFound,
  }),
  partRatio: entry<{
    neighbours: number
    neighbourRate: number
    ratio: number | null
    q: number
    tested: number
    spread: number
    rehearsal: boolean
  }>({
    inputs: ({ neighbours, neighbourRate, tested, spread }) => [
      { symbol: 'm', name: 'neighbours, over all returns', value: neighbours },
      {
        symbol: 'r',
        name: 'rate of the neighbours',
        value: neighbourRate,
        text: formatPercent(neighbourRate, { significant: 3 }),
      },
      { symbol: 'T', name: 'parts compared', value: tested },
      {
        symbol: 'τ',
        name: 'how much like parts differ anyway, in ln',
        value: spread,
        text: formatNumber(spread, { significant: 2 }),
      },
    ],
    method: ({ q }) =>
      `In each return, the twelve nearest of the parts that their surroundings pull about as hard; ratio of the two rates over all returns, each a stratum. A part is a suspect from twice its neighbours’ rate on, with at least ten broken reads, when the false ones among all suspects are expected to be at most 1 %: by the stratified test, and beyond how much like parts differ anyway. Here q is ${q < 1e-6 ? 'below 0.000001' : formatNumber(q, { significant: 2 })}.`,
    result: ({ ratio }) => (ratio === null ? 'neighbours never broke' : formatNumber(ratio, { significant: 2 })),
    sources: () => [MANTEL_HAENSZEL, BENJAMINI_HOCHBERG, OWN],
    caution: ({ rehearsal }) =>
      rehearsal ? CAUTIONS.rehearsal : 'A reason to look at the part, no proof that it is bad.',
  }),
  expectedChain: entry<{ median: number; variables: number; density: number }>({
    inputs: ({ variables, density }) => [
      { symbol: 'n', name: 'variables', value: variables },
      { symbol: 'd', name: 'density', value: density },
    ],
    method: () =>
      'Between the measured points around: evenly in the logarithm of n, then evenly in d. Nothing is said outside of what was measured and found.',
    result: ({ median }) => formatNumber(median, { decimals: 1 }),
    unit: () => 'qubits',
    sources: () => [OWN],
    caution: () => 'Random problems; one with structure may need shorter or longer chains.',
  }),
  missingShare: entry<{ made: number; working: number; what: string }>({
    inputs: ({ made, working, what }) => [
      { symbol: 'M', name: `${what} made`, value: made },
      { symbol: 'w', name: `working ${what}`, value: working },
    ],
    steps: () => [
      {
        symbol: 'x',
        name: 'share missing',
        expr: over(minus('M', 'w'), 'M'),
        show: (value) => formatPercent(value, { significant: 3 }),
      },
    ],
    sources: () => [MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  qubitsEach: entry<{ qubits: number; variables: number }>({
    inputs: ({ qubits, variables }) => [
      { symbol: 'q', name: 'working qubits', value: qubits },
      { symbol: 'n', name: 'variables of the problem', value: variables },
    ],
    steps: () => [
      {
        symbol: 'r',
        name: 'qubits for each variable',
        expr: over('q', 'n'),
        show: (value) => formatNumber(value, { significant: 3 }),
      },
    ],
    method: () => 'Room to spare helps a search, but does not say that an embedding exists.',
    sources: () => [DEFINITION],
  }),
  couplersEach: entry<{ couplers: number; interactions: number }>({
    inputs: ({ couplers, interactions }) => [
      { symbol: 'e', name: 'working couplers', value: couplers },
      { symbol: 'm', name: 'interactions of the problem', value: interactions },
    ],
    steps: () => [
      {
        symbol: 'r',
        name: 'couplers for each interaction',
        expr: over('e', 'm'),
        show: (value) => formatNumber(value, { significant: 3 }),
      },
    ],
    sources: () => [DEFINITION],
  }),
}

const COUNTED =
  'Counted on the published construction: crossing segments share an internal coupler, successive ones on a line an external one, close parallel ones an odd one.'
const COUNTED_IN_FILE = 'Counted in the uploaded graph: pairs of qubits that it joins.'
const RANGE_RULE = {
  h: 'Every programmed field must lie in it.',
  J: 'Every programmed coupling must lie in it, those inside chains too.',
  'coupling sum': 'The signed sum of all programmed couplings at a qubit must lie in it.',
} as const
