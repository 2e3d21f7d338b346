import { groupDigits } from '../../../shared/engine/digits'
import type { ArchiveRows } from './archive-rows'

const counted = (rows: readonly unknown[], one: string, several = `${one}s`): string =>
  `${groupDigits(rows.length)} ${rows.length === 1 ? one : several}`

/** What was taken of an archive, and which frozen run sheets give other values here than were agreed to. */
export function countWords(rows: ArchiveRows, otherwise: readonly number[]): string {
  const things = [
    counted(rows.problems, 'problem'),
    counted(rows.machines, 'machine'),
    counted(rows.embeddings, 'embedding'),
    counted(rows.runSheets, 'run sheet'),
    counted(rows.returns, 'set of samples', 'sets of samples'),
  ].join(', ')
  if (otherwise.length === 0) return `${things}; all fingerprints are the ones that were exported`
  const which = otherwise.map((number) => `RS-${number}`).join(', ')
  return `${things}. This version programmes other values for ${which} than were agreed to: have them reviewed again before they are issued`
}
