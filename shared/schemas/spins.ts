import { z } from 'zod'

/** The chains of these variables, qubit by qubit; null: the logical problem, a spin for each variable. */
export const spinsSchema = z.object({
  variables: z.array(z.string().max(200)).min(1, 'name at least one variable').max(14).nullable().default(null),
})

/** A few spins as they are programmed, for the spectrum. */
export interface SpinsView {
  /** `whi.4`, or `whi.4 at qubit 17`, one a spin. */
  names: string[]
  h: number[]
  /** Two spins a coupling. */
  ends: number[]
  J: number[]
}
