import { execFileSync } from 'node:child_process'
import { mkdirSync, writeFileSync } from 'node:fs'
import { cpus, loadavg } from 'node:os'
import { join } from 'node:path'

export interface ReportOptions {
  readonly json: boolean
  readonly keep: boolean
}

const commit = (): string => {
  try {
    return execFileSync('git', ['rev-parse', '--short', 'HEAD'], { encoding: 'utf8' }).trim()
  } catch {
    return 'unknown'
  }
}

/**
 * Measures, prints the outcome with what it was measured on, and keeps it in `bench/results/` where that is asked for.
 * @param words the outcome as a table, with a last line that goes on with the machine
 */
export async function report<Measured extends object>(
  bench: string,
  { json, keep }: ReportOptions,
  measure: () => Promise<Measured>,
  words: (measured: Measured) => string,
): Promise<void> {
  const [loadBefore, processors] = [loadavg()[0]!, cpus().length]
  const measured = await measure()
  const processor = `${processors} × ${cpus()[0]?.model ?? 'unknown'}`
  const made = { bench, date: new Date().toISOString(), commit: commit(), processor, loadBefore, ...measured }
  console.log(json ? JSON.stringify(made) : `\n${words(measured)}; ${processor}; load ${loadBefore.toFixed(1)}.`)
  if (loadBefore > processors)
    console.error(`The machine was busy (load ${loadBefore.toFixed(1)} on ${processors} processors): measure again.`)
  if (!keep) return
  const path = join('bench', 'results', `${made.date.slice(0, 10)}-${made.commit}-${bench}.json`)
  mkdirSync(join('bench', 'results'), { recursive: true })
  writeFileSync(path, `${JSON.stringify(made, null, 1)}\n`)
  console.error(`Kept in ${path}.`)
}

/** Ends with what went wrong; where it was the options, with how they are given. */
export const failed =
  (usage: string) =>
  (error: unknown): void => {
    console.error(error instanceof TypeError || error instanceof RangeError ? `${error.message}\n\n${usage}` : error)
    process.exitCode = 1
  }

/** @throws RangeError for an option that is no whole number from 1 to the most */
export function whole(name: string, text: string, most = Number.MAX_SAFE_INTEGER): number {
  const value = Number(text)
  if (Number.isSafeInteger(value) && value >= 1 && value <= most) return value
  const range = most === Number.MAX_SAFE_INTEGER ? 'from 1 on' : `from 1 to ${most}`
  throw new RangeError(`--${name} takes whole numbers ${range}, not ${text}`)
}
