import type { Gauge } from '../../shared/engine/programming/gauges'
import { drawGauge } from '../../shared/engine/programming/gauges'
import { readsPerGauge } from '../../shared/engine/programming/machine-time'
import type { BundleInput } from './input'

const PLUS = 43
const MINUS = 45

type Gauged = Pick<BundleInput, 'programmed' | 'sheet'>

/** The signs of a gauge, counted from 0, as a rehearsal draws them: one a chain; a single gauge is the problem as it stands. */
export function gaugeOf({ programmed, sheet: { settings } }: Gauged, number: number): Gauge {
  if (settings.gauges === 1) return new Int8Array(programmed.qubits.length).fill(1)
  return drawGauge(programmed, settings.seed, number, 'chain')
}

/** One line a gauge: its number, the reads it takes, and a + or - for each position of the programmed problem. */
export function gaugesCsv(input: Gauged): string {
  const { gauges, reads } = input.sheet.settings
  const decoder = new TextDecoder()
  const lines = readsPerGauge(reads, gauges).map((share, number) => {
    const signs = Uint8Array.from(gaugeOf(input, number), (sign) => (sign > 0 ? PLUS : MINUS))
    return `${number},${share},${decoder.decode(signs)}\n`
  })
  return `gauge,reads,signs\n${lines.join('')}`
}
