/** The machine sheet's own figures, in microseconds. */
export interface MachineTiming {
  /** Once per programming, that is per gauge. */
  readonly programMicroseconds: number
  /** Once per read. */
  readonly readoutMicroseconds: number
  /** Wait between reads, once per read. */
  readonly delayMicroseconds: number
}

export interface MachineTimeInput {
  /** Programmings of the machine, ≥ 1: one per gauge. */
  readonly gauges: number
  /** Reads in all, over all gauges. */
  readonly reads: number
  readonly annealMicroseconds: number
  readonly timing: MachineTiming
}

/** All in microseconds; the parts add up to the total. */
export interface MachineTimeEstimate {
  readonly programmingMicroseconds: number
  readonly annealMicroseconds: number
  readonly readoutMicroseconds: number
  readonly delayMicroseconds: number
  readonly totalMicroseconds: number
}

/**
 * Estimated machine time: gauges × programming + reads × (anneal + readout + delay). An estimate from what the machine
 * sheet says, never a measurement.
 * @throws RangeError for counts that are not integers (gauges ≥ 1, reads ≥ 0) or a negative time
 */
export function machineTimeEstimate(input: MachineTimeInput): MachineTimeEstimate {
  const { gauges, reads, annealMicroseconds, timing } = input
  if (!(Number.isInteger(gauges) && gauges >= 1))
    throw new RangeError(`gauges must be a whole number from 1, not ${gauges}`)
  if (!(Number.isInteger(reads) && reads >= 0))
    throw new RangeError(`reads must be a whole number from 0, not ${reads}`)
  const times = [annealMicroseconds, timing.programMicroseconds, timing.readoutMicroseconds, timing.delayMicroseconds]
  const bad = times.find((time) => !(Number.isFinite(time) && time >= 0))
  if (bad !== undefined) throw new RangeError(`a time must be a number of microseconds from 0, not ${bad}`)
  const parts = {
    programmingMicroseconds: gauges * timing.programMicroseconds,
    annealMicroseconds: reads * annealMicroseconds,
    readoutMicroseconds: reads * timing.readoutMicroseconds,
    delayMicroseconds: reads * timing.delayMicroseconds,
  }
  const totalMicroseconds =
    parts.programmingMicroseconds + parts.annealMicroseconds + parts.readoutMicroseconds + parts.delayMicroseconds
  return { ...parts, totalMicroseconds }
}

/** Reads of each gauge: as even as possible, the first gauges take one more. */
export function readsPerGauge(reads: number, gauges: number): number[] {
  return Array.from({ length: gauges }, (_, g) => Math.floor(reads / gauges) + (g < reads % gauges ? 1 : 0))
}
