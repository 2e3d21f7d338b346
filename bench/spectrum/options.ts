import { parseArgs } from 'node:util'

export interface SpectrumBenchOptions {
  readonly rounds: number
  readonly spins: number
  readonly points: number
  readonly json: boolean
  readonly keep: boolean
}

export const USAGE = `npm run bench:spectrum -- [options]
  --rounds N     times that every spectrum is worked out (5)
  --spins N      spins of every model, 2 to 14 (12)
  --points N     points from s = 0 to s = 1 (101)
  --json         print JSON only
  --keep         write bench/results/<date>-<commit>-spectrum.json as well`

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): SpectrumBenchOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      rounds: { type: 'string', default: '5' },
      spins: { type: 'string', default: '12' },
      points: { type: 'string', default: '101' },
      json: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const whole = (name: 'rounds' | 'spins' | 'points', least: number, most: number): number => {
    const value = Number(values[name])
    if (!Number.isSafeInteger(value) || value < least || value > most)
      throw new RangeError(`--${name} must be a whole number from ${least} to ${most}, not ${values[name]}`)
    return value
  }
  return {
    rounds: whole('rounds', 1, 1000),
    spins: whole('spins', 2, 14),
    points: whole('points', 2, 1001),
    json: values.json,
    keep: values.keep,
  }
}
