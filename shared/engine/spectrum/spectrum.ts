import type { Control } from '../control'
import type { EnergyTable } from '../machine/energy-table'
import { energiesAt } from '../machine/energies-at'
import { createRandom } from '../random'
import type { Levels } from './lowest-levels'
import { lowestLevels } from './lowest-levels'
import type { SpinModel, SpinOperator } from './spin-operator'
import { spinOperators } from './spin-operator'

export interface SpectrumOptions {
  /** Levels shown, 2 … 12; more are worked out where the ground states at the end are more. */
  readonly levels: number
  /** Points from s = 0 to s = 1, both included, 2 … 1001. */
  readonly points: number
  readonly seed: number
}

export const SPECTRUM_LIMITS = { levels: 12, points: 1001 } as const

/** The levels of a model along the anneal; energies as frequencies in GHz. */
export interface Spectrum {
  readonly s: Float64Array
  /** levels[k][p]: level k at point p, lowest first, as often as it occurs. */
  readonly levels: readonly Float64Array[]
  /** Classical states of least energy at the end of the anneal. */
  readonly groundStates: number
  readonly gap: MinimumGap | null
  /** Largest residual of any level in GHz: how far it may lie from an exact one. */
  readonly residual: number
}

/**
 * The least distance between the lowest level and the first level that does not end in a ground state, the one with as
 * many levels below it as there are ground states at the end.
 */
export interface MinimumGap {
  readonly s: number
  readonly gigahertz: number
  /** The gap at each point of the spectrum. */
  readonly course: Float64Array
}

/** Classical energies closer than this, against the largest coefficient sum, count as equal. */
const TIE = 1e-9
/** Steps of the search for the least gap: the interval shrinks to 1.5e−5 of two points apart. */
const REFINEMENTS = 24

/** Counts the states of least classical energy; sectors without fields hold one of each pair of opposite states. */
function countGroundStates([operator]: readonly SpinOperator[]): number {
  const { classical, mirror } = operator!
  let [least, largest] = [Infinity, 0]
  for (const energy of classical) {
    least = Math.min(least, energy)
    largest = Math.max(largest, Math.abs(energy))
  }
  let count = 0
  for (const energy of classical) if (energy - least <= TIE * largest) count++
  return mirror === 0 ? count : 2 * count
}

/** The levels of all sectors at one point, each begun from the point before. */
class Sectors {
  private readonly last: (readonly Float64Array[])[]
  residual = 0

  constructor(
    private readonly operators: readonly SpinOperator[],
    private readonly table: EnergyTable,
    private readonly count: number,
    private readonly seed: number,
  ) {
    this.last = operators.map(() => [])
  }

  /** @param number of the point: its random numbers depend on it alone */
  at(s: number, number: number): Float64Array {
    const { A, B } = energiesAt(this.table, s)
    const found = this.operators.map((operator, sector): Levels => {
      const random = createRandom(this.seed, 2 * number + sector)
      const levels = lowestLevels(operator, A / 2, B / 2, this.count, this.last[sector]!, random)
      this.last[sector] = levels.vectors
      this.residual = Math.max(this.residual, levels.residual)
      return levels
    })
    return Float64Array.from(found.flatMap(({ energies }) => [...energies]))
      .sort()
      .slice(0, this.count)
  }
}

/** The least gap between two neighbours of the least point, by golden-section search (Kiefer 1953). */
function refine(gapAt: (s: number, step: number) => number, from: number, to: number): { s: number; gap: number } {
  const ratio = (Math.sqrt(5) - 1) / 2
  let [low, high] = [from, to]
  let [left, right] = [high - ratio * (high - low), low + ratio * (high - low)]
  let [atLeft, atRight] = [gapAt(left, 0), gapAt(right, 1)]
  for (let step = 2; step < REFINEMENTS; step++) {
    if (atLeft < atRight) {
      high = right
      right = left
      atRight = atLeft
      left = high - ratio * (high - low)
      atLeft = gapAt(left, step)
    } else {
      low = left
      left = right
      atLeft = atRight
      right = low + ratio * (high - low)
      atRight = gapAt(right, step)
    }
  }
  return atLeft < atRight ? { s: left, gap: atLeft } : { s: right, gap: atRight }
}

function minimumGap(spectrum: Pick<Spectrum, 's' | 'levels' | 'groundStates'>, sectors: Sectors): MinimumGap | null {
  const { s, levels, groundStates } = spectrum
  const upper = levels[groundStates]
  if (!upper) return null
  const course = upper.map((energy, p) => energy - levels[0]![p]!)
  let least = 0
  course.forEach((gap, p) => {
    if (gap < course[least]!) least = p
  })
  const gapAt = (at: number, step: number): number => {
    const energies = sectors.at(at, s.length + step)
    return energies[groundStates]! - energies[0]!
  }
  const [from, to] = [s[Math.max(0, least - 1)]!, s[Math.min(s.length - 1, least + 1)]!]
  const { s: place, gap } = refine(gapAt, from, to)
  // The least may lie at an end of the anneal, where a search between points only comes near it.
  return gap < course[least]!
    ? { s: place, gigahertz: gap, course }
    : { s: s[least]!, gigahertz: course[least]!, course }
}

function requireOptions({ levels, points }: SpectrumOptions): void {
  if (!(Number.isInteger(levels) && levels >= 2 && levels <= SPECTRUM_LIMITS.levels))
    throw new RangeError(`levels must be a whole number from 2 to ${SPECTRUM_LIMITS.levels}, not ${levels}`)
  if (!(Number.isInteger(points) && points >= 2 && points <= SPECTRUM_LIMITS.points))
    throw new RangeError(`points must be a whole number from 2 to ${SPECTRUM_LIMITS.points}, not ${points}`)
}

/**
 * The lowest levels of up to 14 spins along the anneal, H(s) = −A(s)/2 Σ σx_i + B(s)/2 (Σ h_i σz_i + Σ J_ij σz_i σz_j),
 * and the least gap to a level that does not end in a ground state. `gap` is null where the ground states at the end
 * are more than 11, or all states. Reports progress as the share of points done; cancelled, it returns null.
 * @throws RangeError for a model or options outside their limits
 */
export function spectrumOf(
  model: SpinModel,
  table: EnergyTable,
  options: SpectrumOptions,
  control: Pick<Control<{ readonly share: number }>, 'cancelled' | 'report'>,
): Spectrum | null {
  requireOptions(options)
  const operators = spinOperators(model)
  const groundStates = countGroundStates(operators)
  const enough = groundStates < SPECTRUM_LIMITS.levels ? groundStates + 1 : 0
  const count = Math.min(Math.max(options.levels, enough), 1 << model.h.length)
  const sectors = new Sectors(operators, table, count, options.seed)
  const s = Float64Array.from({ length: options.points }, (_, p) => p / (options.points - 1))
  const levels = Array.from({ length: count }, () => new Float64Array(options.points))
  for (let p = 0; p < options.points; p++) {
    if (control.cancelled()) return null
    sectors.at(s[p]!, p).forEach((energy, k) => (levels[k]![p] = energy))
    control.report({ share: (p + 1) / options.points })
  }
  const gap = minimumGap({ s, levels, groundStates }, sectors)
  return { s, levels, groundStates, gap, residual: sectors.residual }
}
