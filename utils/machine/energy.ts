import type { EnergyTable } from '#shared/engine/machine/energy-table'
import { thermalGigahertz } from '#shared/engine/machine/energy-units'
import type { ChartRule, ChartSeries } from '../ui/chart/types'
import { formatNumber } from '../format'

/** How the energies of a machine are shown. */

export interface EnergyCurve {
  /** Told apart where several are shown at once: `calibration 2`. */
  name?: string
  table: EnergyTable
}

const STROKES = [
  { A: 'solid', B: 'dashed' },
  { A: 'dotted', B: 'dotted' },
] as const
/** Where each name is written: A is high at the start, B at the end. */
const LABEL_AT = { A: 0.12, B: 0.82 } as const

/** A and B of each table over s; those of a second table are dotted. */
export const energySeries = (curves: readonly EnergyCurve[]): ChartSeries[] =>
  curves.flatMap(({ name, table }, k) =>
    (['A', 'B'] as const).map((column): ChartSeries => ({
      name: name ? `${column}, ${name}` : column,
      stroke: STROKES[Math.min(k, 1)]![column],
      marker: 'none',
      tone: column === 'A' ? 'slate' : 'leaf',
      points: table.s.map((s, row) => ({ x: s, y: table[column][row]! })),
      ...(curves.length === 1 ? { labelAt: LABEL_AT[column] } : {}),
    })),
  )

/** The thermal energy as a line across the chart. */
export const thermalRule = (millikelvin: number | null): ChartRule[] =>
  millikelvin === null
    ? []
    : [
        {
          axis: 'y',
          at: thermalGigahertz(millikelvin),
          label: `kT at ${formatNumber(millikelvin, { significant: 4 })} mK`,
          tone: 'clay',
          stroke: 'dotted',
          labelEnd: 'right',
        },
      ]

export const gigahertzText = (value: number): string => formatNumber(value, { significant: 4 })

/** The energies at the end of the anneal beside the thermal one; null without a temperature. */
export function thermalFigures(table: EnergyTable, millikelvin: number | null) {
  if (millikelvin === null) return null
  const thermal = thermalGigahertz(millikelvin)
  const half = table.B.at(-1)! / 2
  return { thermal, half, ratio: half / thermal, crossing: crossingOf(table) }
}

/** Where A and B are equal, linear between rows; null where they never are. */
export function crossingOf(table: EnergyTable): number | null {
  for (let k = 0; k + 1 < table.s.length; k++) {
    const before = table.A[k]! - table.B[k]!
    const after = table.A[k + 1]! - table.B[k + 1]!
    if (before >= 0 && after <= 0 && before !== after)
      return table.s[k]! + ((table.s[k + 1]! - table.s[k]!) * before) / (before - after)
  }
  return null
}
