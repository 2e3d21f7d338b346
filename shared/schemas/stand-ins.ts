import { z } from 'zod'
import type { Person } from './common'
import { idSchema } from './common'

const daySchema = z.iso.date('write a day such as 2027-01-31')

/** Reviews handed over for an absence; first and last day, UTC. */
export const makeStandInSchema = z.object({
  /** The reviewer who is away; whoever asks where nothing is said. Owners may name others. */
  forId: idSchema.optional(),
  /** The member who reviews meanwhile. */
  byId: idSchema,
  startsOn: daySchema,
  endsOn: daySchema,
})
export type MakeStandIn = z.infer<typeof makeStandInSchema>

export interface StandInView {
  id: string
  /** The reviewer who is away. */
  for: Person
  /** The member who reviews meanwhile. */
  by: Person
  /** First and last day, UTC. */
  startsOn: string
  endsOn: string
  /** Whether it goes on now. */
  isOn: boolean
}
