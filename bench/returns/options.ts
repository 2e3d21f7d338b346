import { parseArgs } from 'node:util'
import type { ReportOptions } from '../report'
import { whole } from '../report'

export interface ReturnsOptions extends ReportOptions {
  readonly reads: number
  readonly cells: number
  readonly rounds: number
}

export const USAGE = `npm run bench:returns -- [options]
  --reads N      rows of the files (10000)
  --cells N      side of the Chimera machine in cells of eight qubits, all of them used (25: 5000 qubits)
  --rounds N     times that each file is uploaded (3)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-returns.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): ReturnsOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      reads: { type: 'string', default: '10000' },
      cells: { type: 'string', default: '25' },
      rounds: { type: 'string', default: '3' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const { json, keep } = values
  const count = (name: 'reads' | 'cells' | 'rounds'): number => whole(name, values[name])
  return { reads: count('reads'), cells: count('cells'), rounds: count('rounds'), json, keep }
}
