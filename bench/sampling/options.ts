import { parseArgs } from 'node:util'

export interface SamplingOptions {
  readonly rounds: number
  readonly sweeps: number
  readonly reads: number
  readonly json: boolean
  readonly keep: boolean
}

export const USAGE = `npm run bench:sampling -- [options]
  --rounds N     times that every speed is measured (9)
  --sweeps N     sweeps of a measurement (200)
  --reads N      reads of every sample of energies in the two-sample test (320)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-sampling.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): SamplingOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      rounds: { type: 'string', default: '9' },
      sweeps: { type: 'string', default: '200' },
      reads: { type: 'string', default: '320' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const whole = (name: 'rounds' | 'sweeps' | 'reads'): number => {
    const value = Number(values[name])
    if (!Number.isSafeInteger(value) || value < 1)
      throw new RangeError(`--${name} must be a whole number above 0, not ${values[name]}`)
    return value
  }
  return {
    rounds: whole('rounds'),
    sweeps: whole('sweeps'),
    reads: whole('reads'),
    json: values.json,
    keep: values.keep,
  }
}
