import type { PgColumn } from 'drizzle-orm/pg-core'
import { z } from 'zod'
import { RUN_SHEET_STATES } from '../../../shared/library'
import { embeddingMethodSchema, objectiveSchema } from '../../../shared/schemas/embeddings'
import { groupKindSchema } from '../../../shared/schemas/groups'
import { familySchema, sheetSchema } from '../../../shared/schemas/machines'
import { formSchema, senseSchema } from '../../../shared/schemas/problems'
import { decodeSchema } from '../../../shared/schemas/returns'
import { runSheetSettingsSchema } from '../../../shared/schemas/run-sheets'
import { scanSchema } from '../../../shared/schemas/scans'
import { DomainError } from '../../../shared/errors'
import type { WorkRow, WorkTable } from '../../database/repositories/workspace-rows'
import { columnsOf } from '../../database/repositories/workspace-rows'

const MOST_CHARACTERS = 200_000

export const notReadable = (what: string): DomainError =>
  new DomainError('not acceptable', 'archive.content', `The archive cannot be taken: ${what}. Export it once more.`)

const oneOf = (...values: [string, ...string[]]) => z.enum(values)

const index = z.number().int().min(0)
/** Members by their index, where requests name them. */
const storedGroup = z.object({
  name: z.string().max(1000),
  kind: groupKindSchema,
  k: index,
  members: z.array(index),
  source: oneOf('recognised', 'entered'),
})

/** What the database itself does not check: of columns that the product reads as more than text and figures. */
const CHECKED: Partial<Record<WorkTable, Record<string, z.ZodType>>> = {
  machines: {
    family: familySchema.or(
      z.object({ kind: z.literal('custom'), fingerprint: z.string().regex(/^[0-9a-f]{64}$/) }).loose(),
    ),
  },
  calibrations: { sheet: sheetSchema },
  capacityMeasurements: { status: oneOf('measured', 'cancelled', 'failed') },
  problems: { tags: z.array(z.string().max(200)).max(100) },
  problemVersions: { form: formSchema, sense: senseSchema, groups: z.array(storedGroup).max(100_000).nullable() },
  referenceOptima: { status: oneOf('found', 'cancelled', 'failed') },
  embeddings: {
    status: oneOf('found', 'none found', 'cancelled', 'failed'),
    method: embeddingMethodSchema.or(oneOf('imported', 'edited', 'repair', 'shorten')),
    objective: objectiveSchema,
  },
  runSheets: { state: z.enum(RUN_SHEET_STATES), settings: runSheetSettingsSchema },
  runSheetRemarks: { settings: runSheetSettingsSchema.nullable() },
  returns: {
    source: oneOf('rehearsal', 'upload'),
    status: oneOf('ready', 'failed', 'cancelled'),
    settings: runSheetSettingsSchema,
  },
  scans: {
    status: oneOf('ready', 'failed', 'cancelled'),
    settings: runSheetSettingsSchema,
    made: scanSchema,
  },
  answerSheets: { decode: decodeSchema },
}

const KINDS: Record<string, z.ZodType> = {
  PgText: z.string().max(MOST_CHARACTERS),
  PgInteger: z
    .number()
    .int()
    .min(-(2 ** 31))
    .max(2 ** 31 - 1),
  PgBigInt53: z.number().int().min(Number.MIN_SAFE_INTEGER).max(Number.MAX_SAFE_INTEGER),
  PgDoublePrecision: z.number(),
  PgBoolean: z.boolean(),
  PgTimestamp: z.iso.datetime().transform((text) => new Date(text)),
  PgJsonb: z.unknown().refine((value) => value !== undefined && value !== null),
  PgArray: z.array(z.string().max(MOST_CHARACTERS)).max(10_000),
}

/** Held against the schema, but kept as it is written: what is frozen must not gain a default that came later. */
function asWritten(schema: z.ZodType, { columnType }: PgColumn): z.ZodType {
  if (columnType !== 'PgJsonb') return schema
  return z.unknown().superRefine((value, context) => {
    const result = schema.safeParse(value)
    for (const { path, message } of result.success ? [] : result.error.issues)
      context.addIssue({ code: 'custom', path, message })
  })
}

function fieldSchema(name: WorkTable, key: string, column: PgColumn): z.ZodType {
  const kind = CHECKED[name]?.[key] ?? KINDS[column.columnType]
  if (!kind) throw new Error(`column ${name}.${key} is of the kind ${column.columnType}, which no archive knows`)
  const field = column.notNull ? asWritten(kind, column) : asWritten(kind, column).nullable()
  // An archive from before the column was there takes what the database gives.
  return column.notNull && !column.hasDefault ? field : field.optional()
}

const schemas = new Map<WorkTable, z.ZodType<WorkRow>>()

function schemaOf(name: WorkTable): z.ZodType<WorkRow> {
  const known = schemas.get(name)
  if (known) return known
  const fields = Object.entries(columnsOf(name)).map(([key, column]) => [key, fieldSchema(name, key, column)])
  const schema = z.strictObject(Object.fromEntries(fields)) as z.ZodType<WorkRow>
  schemas.set(name, schema)
  return schema
}

/** A row of a table out of a line of an archive. @throws DomainError naming the line and the column */
export function readRow(name: WorkTable, line: string, number: number): WorkRow {
  let value: unknown
  try {
    value = JSON.parse(line)
  } catch {
    throw notReadable(`line ${number} of ${name} is no JSON`)
  }
  const result = schemaOf(name).safeParse(value)
  if (result.success) return result.data
  const { path, message } = result.error.issues[0]!
  throw notReadable(`line ${number} of ${name}, ${path.join('.') || 'the row'}: ${message}`)
}
