import { parseArgs } from 'node:util'

export interface RatesOptions {
  readonly rounds: number
  readonly requests: number
  readonly json: boolean
  readonly keep: boolean
}

export const USAGE = `npm run bench:rates -- [options]
  --rounds N     times that every server is asked in turn (30)
  --requests N   requests to a server in a round (200)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-rates.json as well`

function whole(name: string, text: string): number {
  const value = Number(text)
  if (!Number.isSafeInteger(value) || value < 1)
    throw new RangeError(`--${name} must be a whole number above 0, not ${text}`)
  return value
}

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
