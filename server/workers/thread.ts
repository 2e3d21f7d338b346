import { move, transferableSymbol, valueSymbol } from 'piscina'
import type { Control } from '../../shared/engine/control'
import type { ThreadMessage } from './compute'
import { FLAGS } from './flags'
import { TASKS } from './tasks'

const REPORT_EVERY_SECONDS = 0.1

/** Entry of a worker thread: message → engine → result, with the buffers moved back rather than copied. */
export default async function run({ name, input, port, cancel }: ThreadMessage): Promise<unknown> {
  const flags = new Int32Array(cancel)
  Atomics.store(flags, FLAGS.begun, 1)
  const now = (): number => performance.now() / 1000
  let lastReport = -Infinity
  const control: Control<unknown> = {
    now,
    cancelled: () => Atomics.load(flags, FLAGS.stop) === 1,
    report: (progress) => {
      if (now() - lastReport < REPORT_EVERY_SECONDS) return
      lastReport = now()
      port.postMessage(progress)
    },
  }
  const task = TASKS[name] as (input: unknown, control: Control<unknown>) => unknown
  const output = await task(input, control)
  port.close()
  return move({ [transferableSymbol]: buffersOf(output), [valueSymbol]: output as object })
}

/** The distinct buffers of all typed arrays in a result of plain objects and arrays. */
function buffersOf(result: unknown): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>()
  const visit = (part: unknown): void => {
    if (ArrayBuffer.isView(part)) {
      if (part.buffer instanceof ArrayBuffer) buffers.add(part.buffer)
    } else if (part && typeof part === 'object') Object.values(part).forEach(visit)
  }
  visit(result)
  return [...buffers]
}
