export interface ReadingOptions {
  readonly only: string[]
  readonly entries: number
  readonly rounds: number
  readonly json: boolean
  readonly keep: boolean
}

export const USAGE = `npm run bench:reading -- [options]
  --only NAME    files whose name holds NAME; may be given several times
  --entries N    entries a file (1000000)
  --rounds N     rounds, of which the least counts (9)
  --json         JSON only
  --keep         writes bench/results/<date>-<commit>-reading.json as well`

function countOf(flag: string, text: string | undefined): number {
  const count = Number(text)
  if (!Number.isInteger(count) || count < 1)
    throw new RangeError(`${flag} needs a whole number of at least 1\n${USAGE}`)
  return count
}

/** @throws RangeError for options that there are not */
export function readOptions(args: readonly string[]): ReadingOptions {
  const options = { only: [] as string[], entries: 1_000_000, rounds: 9, json: false, keep: false }
  for (let k = 0; k < args.length; k++) {
    const flag = args[k]!
    if (flag === '--json' || flag === '--keep') options[flag === '--json' ? 'json' : 'keep'] = true
    else if (flag === '--entries') options.entries = countOf(flag, args[++k])
    else if (flag === '--rounds') options.rounds = countOf(flag, args[++k])
    else if (flag === '--only' && args[k + 1]) options.only.push(args[++k]!)
    else throw new RangeError(`unknown option ${flag}\n${USAGE}`)
  }
  return options
}
