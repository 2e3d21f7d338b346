import type { BreakLayer, ChainLayer, Lens, LoadLayer } from './types'

/**
 * Kinds of thing that the legend of the lattice can hide. `couplers` are the rings on the chain in focus, `breaks` the
 * couplers that disagreed with their rates, `labels` the tags on the bands.
 */
export type LatticeKind =
  'free' | 'missing' | 'missingCouplers' | 'marks' | 'regained' | 'labels' | 'couplers' | 'breaks'

/** Chains that are alike in the lens that is on. */
export interface ChainClass {
  /** Unlike that of any other class of any lens. */
  readonly key: string
  readonly words: string
  readonly variables: readonly number[]
}

export const CLASS_DEFAULTS = {
  /** Shares of the machine's range at which a load becomes high and full. */
  highLoad: 0.7,
  fullLoad: 0.9,
  /** Shares of reads at which a chain breaks seldom and often. */
  seldomBroken: 0.02,
  oftenBroken: 0.1,
  /** Most classes of length; longer chains share the last. */
  lengthClasses: 4,
}

export interface ClassInput {
  readonly lens: Lens
  readonly chains: Pick<ChainLayer, 'offsets' | 'qubits' | 'labels'>
  readonly breaks?: BreakLayer | null
  readonly load?: LoadLayer | null
}

/** Classes of chain in a lens: by length, by fullest coupling sum, by break rate. Only those that hold a chain. */
export function chainClasses({ lens, chains, breaks, load }: ClassInput): ChainClass[] {
  const variables = chains.labels.map((_, i) => i)
  if (lens === 'load' && load) return classesBy(variables, loadBounds(), (i) => fullestLoad(chains, load, i))
  if (lens === 'breaks' && breaks) return classesBy(variables, breakBounds(), (i) => breaks.chainRate[i] ?? 0)
  const lengths = variables.map((i) => chains.offsets[i + 1]! - chains.offsets[i]!)
  return classesBy(variables, lengthBounds(lengths), (i) => lengths[i]!)
}

/** Variables of the classes whose keys are given. */
export function chainsOfClasses(classes: readonly ChainClass[], keys: ReadonlySet<string>): Set<number> {
  return new Set(classes.filter(({ key }) => keys.has(key)).flatMap(({ variables }) => variables))
}

/** A class holds what is at most `upTo` and more than the bound before it. */
interface Bound {
  readonly key: string
  readonly words: string
  readonly upTo: number
}

function classesBy(variables: readonly number[], bounds: readonly Bound[], valueOf: (variable: number) => number) {
  const classes = bounds.map(({ key, words }) => ({ key, words, variables: [] as number[] }))
  for (const variable of variables) {
    const value = valueOf(variable)
    const at = bounds.findIndex(({ upTo }) => value <= upTo)
    classes[at < 0 ? classes.length - 1 : at]!.variables.push(variable)
  }
  return classes.filter((kept) => kept.variables.length > 0)
}

function fullestLoad(chains: ClassInput['chains'], load: LoadLayer, variable: number): number {
  const own = chains.qubits.subarray(chains.offsets[variable], chains.offsets[variable + 1])
  return own.reduce((most, qubit) => Math.max(most, load.qubitLoad[qubit] ?? 0), 0)
}

const asPercent = (share: number) => Math.round(100 * share)

function loadBounds(): Bound[] {
  const { highLoad, fullLoad } = CLASS_DEFAULTS
  return [
    { key: 'load up to high', words: `up to ${asPercent(highLoad)} %`, upTo: highLoad },
    { key: 'load high', words: `to ${asPercent(fullLoad)} %`, upTo: fullLoad },
    { key: 'load full', words: `over ${asPercent(fullLoad)} %`, upTo: Infinity },
  ]
}

function breakBounds(): Bound[] {
  const { seldomBroken, oftenBroken } = CLASS_DEFAULTS
  return [
    { key: 'never broken', words: 'never broken', upTo: 0 },
    { key: 'seldom broken', words: `up to ${asPercent(seldomBroken)} %`, upTo: seldomBroken },
    { key: 'broken', words: `to ${asPercent(oftenBroken)} %`, upTo: oftenBroken },
    { key: 'often broken', words: `over ${asPercent(oftenBroken)} %`, upTo: Infinity },
  ]
}

/** Lengths in classes of about the same number of chains, each length in one class only. */
function lengthBounds(lengths: readonly number[]): Bound[] {
  const sorted = [...lengths].sort((a, b) => a - b)
  if (sorted.length === 0) return []
  const ends = new Set<number>()
  for (let k = 1; k <= CLASS_DEFAULTS.lengthClasses; k++)
    ends.add(sorted[Math.ceil((k * sorted.length) / CLASS_DEFAULTS.lengthClasses) - 1]!)
  let from = sorted[0]!
  return [...ends].map((upTo) => {
    const words = from >= upTo ? `${upTo}` : `${from}–${upTo}`
    const bound = { key: `length ${words}`, words: `${words} ${upTo === 1 ? 'qubit' : 'qubits'}`, upTo }
    from = upTo + 1
    return bound
  })
}
