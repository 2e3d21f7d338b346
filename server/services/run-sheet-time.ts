import { machineTimeEstimate } from '../../shared/engine/programming/machine-time'
import type { MachineTimeEstimate } from '../../shared/engine/programming/machine-time'
import type { MachineTimePart, RunSheetSettings, RunSheetView } from '../../shared/schemas/run-sheets'
import type { CalibratedMachine } from './machine-graphs'

/** Something that stands on a machine at a calibration. */
export interface OnMachine {
  machine: Pick<CalibratedMachine, 'sheet'>
}

/** Machine time of a run with these settings, by the machine's own figures at the embedding's calibration. */
export function estimate(
  { machine }: OnMachine,
  { gauges, reads, annealMicroseconds }: RunSheetSettings,
): MachineTimeEstimate {
  const { programmingMicroseconds, readoutMicroseconds, delayMicroseconds } = machine.sheet.timing
  return machineTimeEstimate({
    gauges,
    reads,
    annealMicroseconds,
    timing: { programMicroseconds: programmingMicroseconds, readoutMicroseconds, delayMicroseconds },
  })
}

/** The estimate term by term, and its price where the machine sheet states one. */
export function machineTimeView(bench: OnMachine, settings: RunSheetSettings): RunSheetView['machineTime'] {
  const { gauges, reads, annealMicroseconds } = settings
  const { timing: times, price } = bench.machine.sheet
  const { programmingMicroseconds, readoutMicroseconds, delayMicroseconds } = times
  const time = estimate(bench, settings)
  const term = (part: string, reckoning: string, microseconds: number): MachineTimePart => ({
    part,
    reckoning,
    milliseconds: microseconds / 1000,
  })
  return {
    parts: [
      term('Programming', `${gauges} × ${programmingMicroseconds / 1000} ms`, time.programmingMicroseconds),
      term('Anneal', `${reads} × ${annealMicroseconds} µs`, time.annealMicroseconds),
      term('Read-out', `${reads} × ${readoutMicroseconds} µs`, time.readoutMicroseconds),
      term('Delay', `${reads} × ${delayMicroseconds} µs`, time.delayMicroseconds),
    ],
    totalMilliseconds: time.totalMicroseconds / 1000,
    timing: { programmingMicroseconds, readoutMicroseconds, delayMicroseconds },
    price: price && { ...price, amount: (price.perSecond * time.totalMicroseconds) / 1e6 },
  }
}
