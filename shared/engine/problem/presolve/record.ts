/** Why a variable was taken out of a problem. */
export const RULES = [
  /** It has no interaction: its linear term decides. */
  'isolated',
  /** Whatever its neighbours are, its own change of energy never has the other sign. */
  'sign',
  /** Its one neighbour decides it. */
  'leaf',
  /** One neighbour outweighs all else at it. */
  'follow',
  /** Its two neighbours decide it, and their interaction takes its place. */
  'fold',
  /** Roof duality: so in every optimum of what was left then. */
  'roof strong',
  /** Roof duality: so in some optimum of what was left then, together with the others of the same round. */
  'roof weak',
  /** Its whole component was small enough to try every state. */
  'component',
] as const
export type Rule = (typeof RULES)[number]

/** Stands for "no partner". */
export const NONE = 0xffffffff

/**
 * Variables taken out, in this order. The value of `variable[k]` is bit y + 2z of `table[k]`, where y and z are the
 * values (0 or 1) of its partners `first[k]` and `second[k]`, which were still there when it was taken out; a partner
 * that is `NONE` counts 0. All indices are those of the problem as it was given.
 *
 * Three quantities explain each (in the QUBO form, to be minimised, as it was when the variable was taken out; a change
 * is that of the energy from 0 to 1):
 * - isolated: the linear coefficient;
 * - sign: the least possible change when it is fixed to 0, the greatest when it is fixed to 1;
 * - leaf, follow: the bounding change while the partner is 0, and while it is 1;
 * - fold: the linear coefficient, the interactions with the first and the second partner;
 * - roof: the proved lower bound and the round, from 1;
 * - component: its variables and its least energy.
 */
export interface Steps {
  /** Places in `RULES`. */
  readonly rule: Uint8Array
  readonly variable: Uint32Array
  readonly first: Uint32Array
  readonly second: Uint32Array
  readonly table: Uint8Array
  /** Three a step. */
  readonly quantities: Float64Array
}

/** One step as it is added to a record. */
export interface Step {
  readonly rule: Rule
  readonly variable: number
  readonly first?: number
  readonly second?: number
  readonly table: number
  readonly quantities: readonly number[]
}

/** Tables of a variable that does not depend on others, follows its first partner, or is its opposite. */
export const TABLES = { zero: 0b0000, one: 0b1111, same: 0b1010, opposite: 0b0101 } as const

/** Packs steps into arrays. */
export function packSteps(steps: readonly Step[]): Steps {
  const quantities = new Float64Array(3 * steps.length)
  steps.forEach((step, k) => quantities.set(step.quantities, 3 * k))
  return {
    rule: Uint8Array.from(steps, ({ rule }) => RULES.indexOf(rule)),
    variable: Uint32Array.from(steps, ({ variable }) => variable),
    first: Uint32Array.from(steps, ({ first }) => first ?? NONE),
    second: Uint32Array.from(steps, ({ second }) => second ?? NONE),
    table: Uint8Array.from(steps, ({ table }) => table),
    quantities,
  }
}
