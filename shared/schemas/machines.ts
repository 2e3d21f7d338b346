import { z } from 'zod'
import type { Family } from '../engine/machine/fabric'
import { ENERGY_TABLE_LIMITS, energyTableIssues } from '../engine/machine/energy-table'
import type { SheetDifference } from '../sheet-difference'
import type { Person } from './common'
import { calibrationNumberSchema, nameSchema, textSchema } from './common'

const extent = z.number().int().min(1).max(1000)
const gridExtent = z.number().int().min(1).max(100_000)

export const familySchema = z.discriminatedUnion('kind', [
  z
    .object({
      kind: z.literal('chimera'),
      m: extent,
      n: extent.optional(),
      t: z.number().int().min(1).max(64).default(4),
    })
    .transform((family) => ({ ...family, n: family.n ?? family.m })),
  z.object({ kind: z.literal('pegasus'), m: z.number().int().min(2).max(1000), trimmed: z.boolean().default(true) }),
  z.object({ kind: z.literal('zephyr'), m: extent, t: z.number().int().min(1).max(64).default(4) }),
  z.object({ kind: z.literal('king'), width: gridExtent, height: gridExtent }),
  z.object({ kind: z.literal('square'), width: gridExtent, height: gridExtent }),
  z.object({ kind: z.literal('cubic'), width: gridExtent, height: gridExtent, depth: gridExtent }),
  z.object({ kind: z.literal('heavy-hex'), rows: gridExtent, columns: gridExtent }),
])

/** Lowest and highest value; an end with the wrong sign is named by its place. */
const rangeSchema = z.tuple([z.number(), z.number()]).superRefine(([low, high], context) => {
  const refuse = (end: 0 | 1, message: string) => context.addIssue({ code: 'custom', path: [end], message })
  if (low >= 0) refuse(0, `the lowest value must be below 0, not ${low}`)
  if (high <= 0) refuse(1, `the highest value must be above 0, not ${high}`)
})

export const rangesSchema = z.object({
  h: rangeSchema.default([-1, 1]),
  J: rangeSchema.default([-1, 1]),
  /** Bounds of the sum of all programmed J at one qubit; null where the machine has none. */
  couplingSum: rangeSchema.nullable().default(null),
})

const microseconds = z.number().min(0).max(1e9)
export const timingSchema = z
  .object({
    programmingMicroseconds: microseconds.default(10_000),
    readoutMicroseconds: microseconds.default(100),
    delayMicroseconds: microseconds.default(20),
    annealMinMicroseconds: microseconds.default(1),
    annealMaxMicroseconds: microseconds.default(2000),
    /** Steepest change of s that a schedule may ask for; null where the machine has no such limit. */
    slopeMaxPerMicrosecond: z.number().positive().max(1e6).nullable().default(null),
    /** Most points of a schedule, first and last included; null where schedules cannot be given. */
    schedulePointsMax: z.number().int().min(2).max(1000).nullable().default(null),
  })
  .refine((timing) => timing.annealMinMicroseconds <= timing.annealMaxMicroseconds, {
    path: ['annealMaxMicroseconds'],
    message: 'the longest anneal is shorter than the shortest',
  })

export const controlErrorSchema = z.object({
  h: z.number().min(0).max(10).default(0),
  J: z.number().min(0).max(10).default(0),
})

const qubitNumber = z.number().int().min(0).max(10_000_000)
export const defectsSchema = z.object({
  qubits: z.array(qubitNumber).max(100_000).default([]),
  couplers: z
    .array(z.tuple([qubitNumber, qubitNumber]))
    .max(1_000_000)
    .default([]),
})

const energies = z.array(z.number()).max(ENERGY_TABLE_LIMITS.rows)
/** A(s) and B(s) in GHz; every wrong row is named. */
export const energyTableSchema = z.object({ s: energies, A: energies, B: energies }).superRefine((table, context) => {
  for (const { row, column, message } of energyTableIssues(table).slice(0, 100))
    context.addIssue({ code: 'custom', path: [column, row], message: `row ${row + 1}: ${message}` })
})

/** What machine time costs. */
export const priceSchema = z.object({
  perSecond: z.number().min(0).max(1e9),
  /** Three letters as in ISO 4217. */
  currency: z.string().regex(/^[A-Z]{3}$/, 'three capital letters, such as EUR'),
})

export const sheetSchema = z.object({
  defects: defectsSchema.prefault({}),
  ranges: rangesSchema.prefault({}),
  controlError: controlErrorSchema.prefault({}),
  timing: timingSchema.prefault({}),
  temperatureMillikelvin: z.number().positive().max(1e6).nullable().default(null),
  energyTable: energyTableSchema.nullable().default(null),
  price: priceSchema.nullable().default(null),
  remark: textSchema(2000).default(''),
})
export type MachineSheet = z.infer<typeof sheetSchema>

export const createMachineSchema = sheetSchema.extend({
  name: nameSchema,
  note: textSchema(2000).default(''),
  family: familySchema,
})
export type CreateMachine = z.infer<typeof createMachineSchema>

/** A new calibration states only what changed; the rest is taken over from the one before. */
export const calibrateSchema = z.object({
  defects: defectsSchema.optional(),
  ranges: rangesSchema.optional(),
  controlError: controlErrorSchema.optional(),
  timing: timingSchema.optional(),
  temperatureMillikelvin: z.number().positive().max(1e6).nullable().optional(),
  energyTable: energyTableSchema.nullable().optional(),
  price: priceSchema.nullable().optional(),
  remark: textSchema(2000).default(''),
})
export type Calibrate = z.infer<typeof calibrateSchema>

export const calibrationQuerySchema = z.object({
  calibration: z.coerce.number().pipe(calibrationNumberSchema).optional(),
})
/** Two calibrations of a machine, in any order. */
export const compareCalibrationsSchema = z.object({
  from: z.coerce.number().pipe(calibrationNumberSchema),
  to: z.coerce.number().pipe(calibrationNumberSchema),
  format: z.enum(['json', 'csv']).default('json'),
})

export const graphQuerySchema = calibrationQuerySchema.extend({
  format: z.enum(['json', 'csv', 'mtx']).default('json'),
})

export interface MachineItem {
  id: string
  name: string
  family: string
  calibration: number
  qubits: number
  qubitsMade: number
  couplers: number
  couplersMade: number
  embeddings: number
  changedAt: string
}

export interface CalibrationItem {
  number: number
  missingQubits: number
  missingCouplers: number
  controlError: { h: number; J: number }
  temperatureMillikelvin: number | null
  remark: string
  savedBy: Person
  savedAt: string
  /** Embeddings made at an earlier calibration that this one broke. */
  broke: { id: string; number: number; problem: string }[]
}

export interface MachineView extends MachineItem {
  note: string
  familySizes: Family
  maxDegree: number
  /** The calibration that sheet, counts and changes are of; `calibration` is the one in force. */
  shown: number
  sheet: MachineSheet
  /** Against the calibration before; null at the first. */
  changes: SheetDifference | null
  calibrations: CalibrationItem[]
}

/** One side of a comparison. */
export interface ComparedCalibration {
  number: number
  savedBy: Person
  savedAt: string
  remark: string
  /** Working ones. */
  qubits: number
  couplers: number
  temperatureMillikelvin: number | null
  energyTable: MachineSheet['energyTable']
}

export interface CalibrationComparison {
  machine: { id: string; name: string; calibration: number }
  from: ComparedCalibration
  to: ComparedCalibration
  difference: SheetDifference
}

export interface CalibrationSaved {
  calibration: number
  qubits: number
  couplers: number
  invalidated: {
    embeddings: { id: string; number: number; problem: string }[]
    runSheets: { id: string; number: number }[]
  }
}

/** How a calibration damages an embedding; qubits and couplers by published number. */
export interface EmbeddingDamage {
  /** Chains that lost a qubit, fell apart or lost an interaction's last coupler. */
  chains: number
  ofChains: number
  qubitsLost: number[]
  /** Couplers of the embedding, inside chains or between them, between working qubits. */
  couplersLost: [number, number][]
}

/** How the longest chains at a calibration are measured: random problems of each size and density, embedded by the engine. */
export interface CapacitySettings {
  seed: number
  /** Problems of each size and density. */
  problems: number
  timeLimitSeconds: number
}

/** Random problems of one size and density: how many were embedded, and how. */
export interface ChainLengthPoint {
  variables: number
  density: number
  problems: number
  found: number
  /** Of the embeddings found; null without any. */
  longestChain: { median: number; least: number; most: number } | null
  medianQubits: number | null
  seconds: number
}

export interface CapacityResult {
  complete: Omit<MachineCapacity, 'calibration'> | null
  points: ChainLengthPoint[]
}

/** What a machine holds at a calibration, whatever the problem. */
export interface MachineCapacity {
  calibration: number
  /** Proved upper bound: no complete graph of more than treewidth + 1 variables can be embedded. */
  treewidth: number
  /** The largest complete graph that the templates placed; null where none was. */
  complete: {
    order: number
    /** Qubits of the longest chain. */
    chainLength: number
  } | null
  seed: number
  tries: number
  /** The time was over before all tries: more may be possible, and without `complete` nothing is known. */
  stoppedEarly: boolean
}
