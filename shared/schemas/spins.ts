import { z } from 'zod'

export const spinsSchema = z.object({
  /** The chains of these variables, qubit by qubit; null: the logical problem, a spin for each variable. */
  variables: z.array(z.string().max(200)).min(1, 'name at least one variable').max(14).nullable().default(null),
  /** Of chains: couplings to other chains left out, or acting as fields, those chains held at the best state known. */
  outside: z.enum(['left out', 'held']).default('left out'),
})

export type SpinsQuery = z.infer<typeof spinsSchema>

/** A few spins as they are programmed, for the spectrum. */
export interface SpinsView {
  /** `whi.4`, or `whi.4 at qubit 17`, one a spin. */
  names: string[]
  h: number[]
  /** Two spins a coupling. */
  ends: number[]
  J: number[]
  /** The state at which all other chains are held; null where they are left out. */
  held: HeldState | null
}

/** The best state that is known of a problem: a reference optimum, or the best decoded sample of a run sheet. */
export interface HeldState {
  /** In words: `the reference optimum, proved`, `the best sample of return 2`. */
  from: string
  /** In the problem's own sense and units. */
  energy: number
}
