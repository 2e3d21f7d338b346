import { parentPort } from 'node:worker_threads'
import { readProblem } from '../../shared/engine/formats'
import { LOOPS } from './baseline'

/** Seconds of processor time of each round, and what was read. */
export interface Measured {
  readonly bytes: number
  readonly reading: number[]
  readonly loops: { readonly [name: string]: number[] }
  readonly variables: number
  readonly interactions: number
  readonly rejected: number
  readonly peakMebibytes: number
  /** Resident memory before the first reading, with the file in it. */
  readonly startMebibytes: number
}

function seconds(work: () => unknown): number {
  const before = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(before)
  return (user + system) / 1e6
}

/** Runs reading and loops in turn, so that a busy machine slows both. */
export function measure({ bytes, rounds }: { readonly bytes: Uint8Array; readonly rounds: number }): void {
  const startMebibytes = process.memoryUsage().rss / 2 ** 20
  const reading: number[] = []
  const loops: { [name: string]: number[] } = Object.fromEntries(Object.keys(LOOPS).map((name) => [name, []]))
  let peakMebibytes = 0
  let last = readProblem(new Uint8Array())
  for (let round = 0; round < rounds; round++) {
    reading.push(seconds(() => (last = readProblem(bytes))))
    if (round === 0) peakMebibytes = process.resourceUsage().maxRSS / 1024
    for (const [name, loop] of Object.entries(LOOPS)) loops[name]!.push(seconds(() => loop(bytes)))
  }
  const measured: Measured = {
    bytes: bytes.length,
    reading,
    loops,
    variables: last.problem?.n ?? 0,
    interactions: last.problem?.values.length ?? 0,
    rejected: last.rejectedCount,
    peakMebibytes,
    startMebibytes,
  }
  parentPort!.postMessage(measured)
}
