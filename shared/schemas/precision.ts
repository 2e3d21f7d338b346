import type { Range } from '../engine/programming/ranges'

/** Programmed values counted in equal bins over the machine's range, ascending; the last bin includes its end. */
export interface ValueCounts {
  range: Range
  sigma: number
  counts: number[]
}

/** A coefficient that drowns in control error. */
export interface DrownedView {
  /** Label of a field's variable, labels of an interaction's two. */
  of: string[]
  /** Of the Ising form, before scaling. */
  value: number
  /** α·|value|, in programmed units. */
  size: number
  perSigma: number
  /** Qubits or couplers that share it with a value other than 0. */
  parts: number
}

/** The run with every chain strength times `factor`. */
export interface StrengthEffectView {
  factor: number
  k: { min: number; max: number }
  /** 0 where the chosen scale leaves the machine's ranges; nothing else is known then but the chains. */
  scale: number
  under: number
  of: number
  /** One standard deviation, in units of the problem; null at scale 0. */
  noise: number | null
  chainsBelowBound: number
}

/** What the machine's control error does to what is programmed. */
export interface PrecisionView {
  /** Fields that are not 0. */
  fields: ValueCounts
  /** Couplings between chains; `inside` counts those of chains in the same bins. */
  couplings: ValueCounts & { inside: number[] }
  drowned: {
    under: number
    /** Nonzero coefficients whose kind has a control error. */
    of: number
    /** The most drowned first. */
    first: DrownedView[]
  }
  effects: StrengthEffectView[]
}
