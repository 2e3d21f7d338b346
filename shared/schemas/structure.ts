import { z } from 'zod'
import { versionNumberSchema } from './common'
import { formSchema } from './problems'

/** Of the sparsity picture: most bins a side, bytes of its counts and its labels; up to how many variables it shows cells. */
export const SPARSITY_LIMITS = { bins: 600, bytes: 184_000, cells: 96, labelBytes: 8000 } as const

export const sparsityQuerySchema = z.object({
  version: versionNumberSchema.optional(),
  /** Of the coefficients in the cells of small problems; as given where it is left out. */
  form: formSchema.optional(),
  bins: z.coerce.number().int().min(1).max(SPARSITY_LIMITS.bins).default(SPARSITY_LIMITS.bins),
  /** Variables as given, or in reverse Cuthill–McKee order. */
  order: z.enum(['given', 'banded']).default('given'),
})
export type SparsityQuery = z.infer<typeof sparsityQuerySchema>

/** What travels in the header of the packed answer; arrays: `counts`, and of small problems `rows`, `cols`, `values`, `linear`. */
export interface SparsityMeta {
  variables: number
  interactions: number
  form: z.infer<typeof formSchema>
  order: SparsityQuery['order']
  /** Bins a side; bin q holds the places from ⌈q·variables/bins⌉ up to, but not, ⌈(q + 1)·variables/bins⌉. */
  bins: number
  /** Greatest distance of an interaction from the diagonal, in places: in this order and in the order given. */
  bandwidth: number
  givenBandwidth: number
  /** Interactions by distance from the diagonal. */
  distances: { from: number; to: number; count: number }[]
  /** In the order of the places; null where there are too many to send. */
  labels: string[] | null
  fingerprint: string
  seconds: number
  version: string
}

interface Signs {
  negative: number
  zero: number
  positive: number
}

/** A problem's coefficients beside the control error of one machine, before any embedding. */
export interface MachinePrecision {
  machineId: string
  machine: string
  calibration: number
  sigmaH: number
  sigmaJ: number
  /** Brings the largest coefficient into its range, at most 1. */
  scale: number
  /** Nonzero fields and interactions of the Ising form. */
  coefficients: number
  /** Those with a scaled size under 2σ. */
  fieldsUnder: number
  interactionsUnder: number
}

/** The slower part of the structure report; signs are in the problem's own sense. */
export interface StructureDetailsView {
  variables: number
  interactions: number
  treewidthLowerBound: number
  componentSizes: { variables: number; count: number }[]
  distinct: { linear: number; interactions: number }
  fields: Signs
  couplings: Signs
  balanced: boolean
  triangles: { count: number; frustrated: number } | null
  symmetries: {
    free: number
    mirrored: number
    interchangeable: { sets: number; variables: number; largest: number }
  }
  machines: MachinePrecision[]
  fingerprint: string
  seconds: number
  version: string
}
