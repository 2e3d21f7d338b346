import { parseArgs } from 'node:util'
import type { Method } from '../../shared/engine/embedding/method'

export interface BenchOptions {
  readonly json: boolean
  readonly only: readonly string[]
  readonly seeds: number
  /** Overrides the time limit of every row; null leaves them. */
  readonly seconds: number | null
  readonly quick: boolean
  readonly baseline: boolean
  readonly keep: boolean
  readonly memory: boolean
  readonly method: Method | 'auto'
  readonly tries: number
  /** The one row that this process measures for another that started it; null in the one that was started by hand. */
  readonly child: string | null
}

export const USAGE = `npm run bench:embedding -- [options]
  --only NAME      rows whose name holds NAME; may be given several times
  --seeds N        seeds a row (10; 2 with --quick)
  --seconds S      time limit of every row, in seconds of processor time
  --quick          a few rows, under two minutes
  --no-baseline    leave the baseline out
  --method M       auto, search, lines or template (auto)
  --tries N        tries of the engine on each seed (1)
  --memory         peak memory instead of time
  --json           print JSON only
  --keep           write bench/results/<date>-<commit>.json as well`

const METHODS: readonly (Method | 'auto')[] = ['auto', 'search', 'lines', 'template']

function positive(name: string, value: string, whole: boolean): number {
  const number = Number(value)
  if (!(number > 0) || (whole && !Number.isSafeInteger(number)))
    throw new RangeError(`--${name} must be a ${whole ? 'whole ' : ''}number above 0, not ${value}`)
  return number
}

/** @throws TypeError or RangeError for options that do not exist or are out of range */
export function readOptions(args: readonly string[]): BenchOptions {
  const { values } = parseArgs({
    args: [...args],
    options: {
      json: { type: 'boolean', default: false },
      only: { type: 'string', multiple: true, default: [] },
      seeds: { type: 'string' },
      seconds: { type: 'string' },
      quick: { type: 'boolean', default: false },
      'no-baseline': { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
      memory: { type: 'boolean', default: false },
      method: { type: 'string', default: 'auto' },
      tries: { type: 'string', default: '1' },
      child: { type: 'string' },
    },
  })
  const method = METHODS.find((name) => name === values.method)
  if (!method) throw new RangeError(`--method must be one of ${METHODS.join(', ')}`)
  return {
    json: values.json,
    only: values.only,
    seeds: positive('seeds', values.seeds ?? (values.quick ? '2' : '10'), true),
    seconds: values.seconds === undefined ? null : positive('seconds', values.seconds, false),
    quick: values.quick,
    baseline: !values['no-baseline'],
    keep: values.keep,
    memory: values.memory,
    method,
    tries: positive('tries', values.tries, true),
    child: values.child ?? null,
  }
}
