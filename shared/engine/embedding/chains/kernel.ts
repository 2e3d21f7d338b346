import type { KernelChoice, KernelExports } from '../../assembly'
import { instantiate, PAGE } from '../../assembly'
import { BYTES } from './growth-bytes'

interface GrowthExports extends KernelExports {
  grow(variable: number, start: number, placed: number, ceiling: number, touchNow: number): number
}

/** Arrays by name, in one linear memory when a kernel works on them. */
export interface Arrays<I extends string, F extends string> {
  readonly ints: Readonly<Record<I, Int32Array>>
  readonly floats: Readonly<Record<F, Float64Array>>
  readonly kernel: GrowthExports | null
}

/**
 * Allocates named arrays of the given lengths, zeroed: in the memory of a fresh kernel, or each by itself for the plain
 * code.
 */
export function allocate<I extends string, F extends string>(
  choice: KernelChoice,
  intLengths: Readonly<Record<I, number>>,
  floatLengths: Readonly<Record<F, number>>,
): Arrays<I, F> {
  const sum = (lengths: Readonly<Record<string, number>>): number =>
    Object.values(lengths).reduce((total, length) => total + length, 0)
  const room = 4 * sum(intLengths) + 8 * sum(floatLengths)
  const kernel = choice === 'plain' ? null : instantiate<GrowthExports>(BYTES, room)
  let at = PAGE
  const place = (bytes: number): number => (at += bytes) - bytes
  const floats = {} as Record<F, Float64Array>
  const ints = {} as Record<I, Int32Array>
  for (const name in floatLengths) {
    const length = floatLengths[name]
    floats[name] = kernel ? new Float64Array(kernel.memory.buffer, place(8 * length), length) : new Float64Array(length)
  }
  for (const name in intLengths) {
    const length = intLengths[name]
    ints[name] = kernel ? new Int32Array(kernel.memory.buffer, place(4 * length), length) : new Int32Array(length)
  }
  return { ints, floats, kernel }
}
