import { timeToSolution } from '../../shared/engine/readout/intervals'
import type { Success } from '../../shared/engine/readout/success'
import type { EffectiveTemperature } from '../../shared/engine/readout/temperature'
import type { Needed, SuccessView, TemperatureView } from '../../shared/schemas/return-analysis'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { proportion } from './proportion'
import type { OnMachine } from './run-sheet-time'
import { estimate } from './run-sheet-time'

/** Machine time of samples, and whether it came with them or is the estimate of the run sheet. */
export interface TimeOfReads {
  millisecondsPerRead: number
  isTimeMeasured: boolean
}

export function timeOfReads({ made, reads, settings }: ReturnRow, machine: OnMachine): TimeOfReads {
  const measured = Number(made.machineTimeSeconds ?? 0)
  if (measured > 0) return { millisecondsPerRead: (1000 * measured) / reads, isTimeMeasured: true }
  const { totalMicroseconds } = estimate(machine, settings)
  return { millisecondsPerRead: totalMicroseconds / 1000 / settings.reads, isTimeMeasured: false }
}

/** What JSON has no number for becomes null. */
const finite = (value: number): number | null => (Number.isFinite(value) ? value : null)
const needed = (value: number, low: number, high: number): Needed => ({
  value: finite(value),
  low: finite(low),
  high: finite(high),
})

/** Success with its interval, and the reads and the time that follow from it. */
export function successView(success: Success, time: TimeOfReads): Omit<SuccessView, 'reference'> {
  const { r99, r99Interval, successes, trials } = success
  const toSolution = timeToSolution(success, time.millisecondsPerRead)
  return {
    ...proportion(successes, trials),
    r99: needed(r99, r99Interval.low, r99Interval.high),
    ...time,
    milliseconds: needed(toSolution.time, toSolution.low, toSolution.high),
  }
}

export const temperatureView = (found: EffectiveTemperature | null): TemperatureView | null =>
  found && { ...found, inverseTemperature: finite(found.inverseTemperature) }
