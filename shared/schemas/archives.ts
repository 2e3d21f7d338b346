import { z } from 'zod'
import type { Role } from './common'
import { textSchema } from './common'

/** The name is asked for so that nobody deletes another workspace than they mean. */
export const deleteWorkspaceSchema = z.object({ name: textSchema(80).min(1, 'write the name of the workspace') })

/** What of a workspace goes into its archive. */
export interface WorkspaceView {
  id: string
  name: string
  createdAt: string
  /** When it is deleted for good; null while nobody asked for that. */
  deletesAt: string | null
  /** Without what is being worked on at the moment. */
  holds: { problems: number; machines: number; embeddings: number; runSheets: number; returns: number; records: number }
  /** Of its arrays, before they are packed. */
  bytes: number
}

/** Somebody who was a member where the archive of the workspace comes from, and has not come here yet. */
export interface ArchivedMemberView {
  id: string
  name: string
  email: string
  roles: Role[]
}

/** What a finished import tells in its job's `detail`. */
export interface ImportedDetail {
  workspaceId: string
  workspace: string
}
