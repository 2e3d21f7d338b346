/** A closed range of programmable values, lowest first. */
export type Range = readonly [min: number, max: number]

/**
 * What a machine can be programmed with, in its own dimensionless units; ranges may be asymmetric.
 * `couplingSum` bounds the sum of the couplings at each qubit; null where the machine has no such limit.
 */
export interface MachineRanges {
  readonly h: Range
  readonly J: Range
  readonly couplingSum: Range | null
}

export interface RangeProblem {
  readonly path: 'h' | 'J' | 'couplingSum'
  readonly message: string
}

function rangeProblem(name: string, [min, max]: Range): string | null {
  if (!Number.isFinite(min) || !Number.isFinite(max)) return `${name}: both ends must be numbers, not ${min} and ${max}`
  if (min > max) return `${name}: the lower end ${min} lies above the upper end ${max}`
  if (min > 0 || max < 0) return `${name}: the range ${min} to ${max} leaves out 0, the value of an unused part`
  return null
}

const chainProblem = (name: string, [min]: Range): string | null =>
  min < 0 ? null : `${name}: the lower end must be below 0, since chains are held by negative couplings`

/**
 * What is wrong with a machine's ranges, in words for the person who entered them: each must be finite, in order and
 * hold 0; J and the coupling sum must reach below 0. A range 0 to 0 of h is allowed: a machine without fields.
 */
export function rangeProblems({ h, J, couplingSum }: MachineRanges): RangeProblem[] {
  const found: [RangeProblem['path'], string | null][] = [
    ['h', rangeProblem('h', h)],
    ['J', rangeProblem('J', J) ?? chainProblem('J', J)],
  ]
  if (couplingSum !== null) {
    const name = 'coupling sum'
    found.push(['couplingSum', rangeProblem(name, couplingSum) ?? chainProblem(name, couplingSum)])
  }
  return found.flatMap(([path, message]) => (message === null ? [] : [{ path, message }]))
}
