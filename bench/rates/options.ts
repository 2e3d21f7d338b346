import { parseArgs } from 'node:util'
import type { ReportOptions } from '../report'
import { whole } from '../report'

export interface RatesOptions extends ReportOptions {
  readonly rounds: number
  readonly requests: number
}

export const USAGE = `npm run bench:rates -- [options]
  --rounds N     times that every server is asked in turn (30)
  --requests N   requests to a server in a round (200)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-rates.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): RatesOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      rounds: { type: 'string', default: '30' },
      requests: { type: 'string', default: '200' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const { json, keep } = values
  return { rounds: whole('rounds', values.rounds), requests: whole('requests', values.requests), json, keep }
}
