import { z } from 'zod'
import { nameSchema, versionNumberSchema } from './common'
import type { ConstraintGroup } from './problems'

export const GROUP_LIMITS = { groups: 2000, members: 20_000, membersInAll: 200_000 } as const
export const groupKindSchema = z.enum(['exactly', 'at most', 'at least'])

export const groupSchema = z.strictObject({
  name: nameSchema,
  kind: groupKindSchema,
  k: z.number().int().min(0).max(GROUP_LIMITS.members),
  /** Labels of the variables. */
  members: z
    .array(z.string().max(200))
    .min(2, 'a group has at least two members')
    .max(GROUP_LIMITS.members, `at most ${GROUP_LIMITS.members} members`),
  source: z.enum(['recognised', 'entered']).default('entered'),
})
export const saveGroupsSchema = z.object({
  /** The version whose variables they are; refused when another one came in between. */
  version: versionNumberSchema.optional(),
  groups: z.array(groupSchema).max(GROUP_LIMITS.groups, `at most ${GROUP_LIMITS.groups} groups`),
})
export type SaveGroups = z.infer<typeof saveGroupsSchema>

/** The penalty of a group beside what the rest of the objective can gain; see shared/engine/problem/groups/penalty.ts. */
export interface PenaltyView {
  weight: number | null
  pairs: number
  pairsDeviating: number
  greatestDeviation: number
  overlaps: number
  single: number | null
  sufficient: number | null
  verdict: 'strong enough' | 'larger than needed' | 'beats single changes' | 'may be too weak' | null
}

export interface GroupView extends Omit<ConstraintGroup, 'members'> {
  /** Labels. */
  members: string[]
  /** Null when the groups have too many pairs of members to look at. */
  penalty: PenaltyView | null
}

export interface GroupsView {
  /** The version of the problem that they belong to. */
  problemVersion: number
  variables: number
  /** As recognised from the coefficients. */
  recognised: GroupView[]
  /** False when the search ended before all couplings were looked at. */
  complete: boolean
  /** As confirmed or entered; null while nobody has looked at them. */
  confirmed: GroupView[] | null
  fingerprint: string
  seconds: number
  version: string
}
