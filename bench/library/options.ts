import { parseArgs } from 'node:util'
import type { ReportOptions } from '../report'
import { whole } from '../report'

export interface LibraryOptions extends ReportOptions {
  readonly problems: number
  readonly rounds: number
}

export const USAGE = `npm run bench:library -- [options]
  --problems N   problems in the library (10000)
  --rounds N     times that every request and page is measured (15)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-library.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): LibraryOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      problems: { type: 'string', default: '10000' },
      rounds: { type: 'string', default: '15' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const { json, keep } = values
  return { problems: whole('problems', values.problems), rounds: whole('rounds', values.rounds), json, keep }
}
