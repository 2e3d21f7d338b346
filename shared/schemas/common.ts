import { z } from 'zod'

/** The five roles of a workspace; a person may hold several. */
export const ROLES = ['owner', 'developer', 'steward', 'reviewer', 'reader'] as const
export const roleSchema = z.enum(ROLES)
export type Role = z.infer<typeof roleSchema>

export const idSchema = z.string().min(1).max(64)
export const nameSchema = z.string().trim().min(1, 'give a name').max(120, 'a name has at most 120 characters')

/** Seeds stay exactly representable on both sides of JSON. */
export const seedSchema = z.number().int().min(0).max(Number.MAX_SAFE_INTEGER)

/** `?limit&cursor` of every list. */
export const pageQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(200).optional(),
})
export type PageQuery = z.infer<typeof pageQuerySchema>

export interface Page<T> {
  items: T[]
  nextCursor: string | null
}

/** A proportion with its Wilson 95 % interval. */
export interface Proportion {
  count: number
  total: number
  rate: number
  low: number
  high: number
}

/** Values v with from ≤ v < to (the last bin includes `to`); from = to when the bin holds one value only. */
export interface HistogramBin {
  readonly from: number
  readonly to: number
  readonly count: number
}

/** Who did something, as shown on a page. */
export interface Person {
  id: string
  name: string
}
