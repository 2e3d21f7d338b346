/** Which arm of a slot's chain meets another slot's. */
export const FIRST_ARM = 0
export const SECOND_ARM = 1
export const NO_ARM = 2

/**
 * Chains laid out in advance, to be given to variables. The chain of a slot has one or two arms, each a row of qubits in
 * which successive ones are joined; two arms are joined where the slot says its corner is.
 */
export interface Template {
  readonly slots: number
  /** Both arms of each slot; an arm may be empty. Arms of different slots share no qubit. */
  readonly arms: readonly (readonly [Uint32Array, Uint32Array])[]
  /** corners[2·s + arm]: the place on that arm of the qubit joined to the other arm, −1 without one. */
  readonly corners: Int16Array
  /** armTo[s·slots + t]: the arm of slot s that meets slot t, `NO_ARM` when they do not meet. */
  readonly armTo: Uint8Array
  /** placeTo[s·slots + t]: the place on that arm of the qubit that meets slot t. */
  readonly placeTo: Int16Array
  /** Only slots of one group can be exchanged; a single group in complete templates. */
  readonly groupOf: Uint8Array
}

/** Notes that slots s and t meet at the given places of the given arms. */
export function setMeeting(
  { slots, armTo, placeTo }: Template,
  [s, armOfS, placeOnS]: readonly [number, number, number],
  [t, armOfT, placeOnT]: readonly [number, number, number],
): void {
  armTo[s * slots + t] = armOfS
  placeTo[s * slots + t] = placeOnS
  armTo[t * slots + s] = armOfT
  placeTo[t * slots + s] = placeOnT
}

/** A template in which no two slots meet yet. */
export function emptyTemplate(arms: readonly (readonly [Uint32Array, Uint32Array])[]): Template {
  const slots = arms.length
  return {
    slots,
    arms,
    corners: new Int16Array(2 * slots).fill(-1),
    armTo: new Uint8Array(slots * slots).fill(NO_ARM),
    placeTo: new Int16Array(slots * slots).fill(-1),
    groupOf: new Uint8Array(slots),
  }
}
