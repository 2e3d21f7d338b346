import { groupDigits } from '#shared/engine/digits'
import type { WorkspaceView } from '#shared/schemas/archives'

/** What an archive holds, by line of a table. */
export const holdingRows = (holds: WorkspaceView['holds']): { what: string; count: string }[] =>
  (
    [
      ['Problems, with their versions', holds.problems],
      ['Machines, with their calibrations', holds.machines],
      ['Embeddings', holds.embeddings],
      ['Run sheets, with their remarks', holds.runSheets],
      ['Sets of samples', holds.returns],
      ['Entries of the budget and of the audit trail', holds.records],
    ] as const
  ).map(([what, count]) => ({ what, count: groupDigits(count) }))
