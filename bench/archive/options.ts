import { parseArgs } from 'node:util'
import type { ReportOptions } from '../report'
import { whole } from '../report'

export interface ArchiveOptions extends ReportOptions {
  /** Of the samples in the workspace, MB. */
  readonly sizes: readonly number[]
  readonly reads: number
}

/** An archive may have 1 GiB, and samples are not made smaller by packing. */
const MOST_MEGABYTES = 1050

export const USAGE = `npm run bench:archive -- [options]
  --sizes N,N    megabytes of samples in the workspaces, up to ${MOST_MEGABYTES} (100,1000)
  --reads N      reads of each set of samples, of 2,048 qubits (20000)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-archive.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): ArchiveOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      sizes: { type: 'string', default: '100,1000' },
      reads: { type: 'string', default: '20000' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const { json, keep } = values
  const sizes = values.sizes.split(',').map((text) => whole('sizes', text, MOST_MEGABYTES))
  return { sizes, reads: whole('reads', values.reads, 1_000_000), json, keep }
}
