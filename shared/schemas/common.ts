import { z } from 'zod'

/** The five roles of a workspace; a person may hold several. */
export const ROLES = ['owner', 'developer', 'steward', 'reviewer', 'reader'] as const
export const roleSchema = z.enum(ROLES)
export type Role = z.infer<typeof roleSchema>

export const idSchema = z.string().regex(/^[\w-]{1,64}$/, 'this is not an id')

/** The database stores neither U+0000 nor half of a surrogate pair. */
const isStorable = (text: string): boolean => !/\0|\p{Cs}/u.test(text)

/** Free text of at most `length` characters, without white space around it. */
export const textSchema = (length: number) =>
  z.string().trim().max(length, `at most ${length} characters`).refine(isStorable, 'a character cannot be stored')

/** Line breaks and other control characters, and those that turn the direction of what stands after a name. */
const BREAKS_LINE = /[\p{Cc}\p{Zl}\p{Zp}\u202a-\u202e\u2066-\u2069]/u
const isInvisible = (text: string): boolean => text !== '' && /^[\p{Cf}\p{Z}]+$/u.test(text)

/** What something or somebody is called: one line that leaves the text around it as it is. */
export const lineSchema = (length: number) =>
  textSchema(length)
    .refine((text) => !BREAKS_LINE.test(text), 'a name is one line, without control characters')
    .refine((text) => !isInvisible(text), 'a name has something that can be seen')

const MAX_NAME_LENGTH = 120
export const nameSchema = lineSchema(MAX_NAME_LENGTH).min(1, 'give a name')

/** As much of a text from elsewhere as can be a name; empty where nothing can. */
export function nameFrom(text: string): string {
  const line = text.replace(new RegExp(BREAKS_LINE, 'gu'), '').slice(0, MAX_NAME_LENGTH)
  const name = line.replace(/\p{Cs}/gu, '').trim()
  return isInvisible(name) ? '' : name
}

/** Calibrations are counted in the database's 32-bit integers. */
export const calibrationNumberSchema = z
  .number()
  .int()
  .min(1)
  .max(2 ** 31 - 1)

/** Versions of a problem, as parts of an address. */
export const versionNumberSchema = z.coerce
  .number()
  .int()
  .min(1)
  .max(2 ** 31 - 1)

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

/** Yes or no as a form or an address says it; whatever else is said means no. */
export const flag = z.preprocess(
  (value) => value === true || value === 'true' || value === '1' || value === 'on',
  z.boolean(),
)
