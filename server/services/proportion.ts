import { wilson } from '../../shared/engine/readout/intervals'
import type { Proportion } from '../../shared/schemas/common'

/** A rate with its Wilson 95 % interval; anything from 0 to 1 where nothing was counted. */
export function proportion(count: number, total: number): Proportion {
  const { low, high } = wilson(count, total)
  return { count, total, rate: total > 0 ? count / total : 0, low, high }
}
