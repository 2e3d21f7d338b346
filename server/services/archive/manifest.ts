import { z } from 'zod'
import { roleSchema } from '../../../shared/schemas/common'
import type { WorkTable } from '../../database/repositories/workspace-rows'
import { WORK_TABLE_NAMES } from '../../database/repositories/workspace-rows'

export const ARCHIVE_FORMAT = 'espalier workspace'
export const ARCHIVE_VERSION = 1

/** What is taken at most, so that an archive cannot fill memory or disk: unpacked, in bytes, but for the entries. */
export const ARCHIVE_LIMITS = {
  file: 2 ** 30,
  manifest: 64 * 2 ** 20,
  rows: 256 * 2 ** 20,
  blob: 2 ** 30,
  total: 8 * 2 ** 30,
  entries: 500_000,
} as const

const id = z.string().min(1).max(100)
const sha256 = z.string().regex(/^[0-9a-f]{64}$/)
const moment = z.iso.datetime()

/** Says what is in the archive of a workspace, and that nothing of it was changed. */
export const manifestSchema = z.object({
  format: z.literal(ARCHIVE_FORMAT),
  formatVersion: z.literal(ARCHIVE_VERSION),
  /** Of the product, and the newest change of the database that it knew. */
  version: z.string().max(50),
  migration: z.string().max(200),
  madeAt: moment,
  madeBy: z.string().max(200),
  workspace: z.object({ id, name: z.string().min(1).max(200), createdAt: moment }),
  /** Everybody who is named in it; roles of those who are members. */
  people: z.array(
    z.object({
      id,
      name: z.string().min(1).max(200),
      email: z.string().max(320).nullable(),
      roles: z.array(roleSchema).max(10),
    }),
  ),
  rows: z.record(z.string(), z.object({ rows: z.number().int().min(0), sha256 })),
  blobs: z.record(id, z.object({ bytes: z.number().int().min(0), sha256 })),
})
export type Manifest = z.infer<typeof manifestSchema>

export const MANIFEST_PATH = 'manifest.json'
export const rowsPath = (name: WorkTable): string => `rows/${name}.ndjson`
export const blobPath = (id: string): string => `blobs/${id}`

export const isWorkTable = (name: string): name is WorkTable => (WORK_TABLE_NAMES as string[]).includes(name)
