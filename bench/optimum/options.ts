import { parseArgs } from 'node:util'

export interface OptimumOptions {
  readonly only: readonly string[]
  readonly rounds: number
  readonly json: boolean
  readonly keep: boolean
}

export const USAGE = `npm run bench:optimum -- [options]
  --only NAME    rows whose name holds NAME; may be given several times
  --rounds N     times that every row is measured (3)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-optimum.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): OptimumOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      only: { type: 'string', multiple: true, default: [] },
      rounds: { type: 'string', default: '3' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const rounds = Number(values.rounds)
  if (!Number.isSafeInteger(rounds) || rounds < 1)
    throw new RangeError(`--rounds must be a whole number above 0, not ${values.rounds}`)
  return { only: values.only, rounds, json: values.json, keep: values.keep }
}
