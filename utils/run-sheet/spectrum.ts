import { thermalGigahertz } from '#shared/engine/machine/energy-units'
import { pausePlace } from '#shared/engine/spectrum/pause'
import type { Spectrum } from '#shared/engine/spectrum/spectrum'
import type { ChartRule, ChartSeries } from '../ui/chart/types'
import { formatCount, formatNumber, formatSignificant } from '../format'

/** How a spectrum is shown: every level over the lowest one, in GHz. */

const STROKES = ['solid', 'dashed', 'dotted'] as const

export function levelSeries({ s, levels, groundStates }: Spectrum): ChartSeries[] {
  const [lowest] = levels
  return levels.slice(1).map((level, k) => ({
    name: k + 1 < groundStates ? `level ${k + 1}, ends in a ground state` : `level ${k + 1}`,
    marker: 'none',
    // The first level that does not end in a ground state is the one that counts.
    stroke: k + 1 === groundStates ? 'solid' : STROKES[1 + (k % 2)]!,
    tone: k + 1 === groundStates ? 'leaf' : k + 1 < groundStates ? 'slate' : 'ink2',
    points: Array.from(s, (x, p) => ({ x, y: level[p]! - lowest![p]! })),
  }))
}

export function spectrumRules({ gap }: Spectrum, millikelvin: number | null): ChartRule[] {
  const rules: ChartRule[] = []
  if (gap) rules.push({ axis: 'x', at: gap.s, label: `least gap at s = ${formatSignificant(gap.s)}`, tone: 'leaf' })
  if (millikelvin !== null)
    rules.push({
      axis: 'y',
      at: thermalGigahertz(millikelvin),
      label: `kT at ${formatNumber(millikelvin, { significant: 3 })} mK`,
      tone: 'clay',
      stroke: 'dotted',
      labelEnd: 'right',
    })
  return rules
}

/** What the spectrum says, in sentences. */
export function spectrumText({ gap, groundStates }: Spectrum, millikelvin: number | null): string {
  const ends = `${formatCount(groundStates, 'ground state')} at the end.`
  if (!gap) return `${ends} They are too many for a gap to the others to be told from this few levels.`
  const least = `The least gap is ${formatSignificant(gap.gigahertz)} GHz, at s = ${formatSignificant(gap.s)}.`
  if (millikelvin === null) return `${least} ${ends}`
  const kT = thermalGigahertz(millikelvin)
  const heat = formatSignificant(kT)
  return gap.gigahertz < kT
    ? `${least} That is under kT, ${heat} GHz: heat mixes the two levels there. ${ends}`
    : `${least} That is over kT, ${heat} GHz. ${ends}`
}

/** Why a pause may serve there. */
export const pauseReason = ({ gap }: Spectrum, millikelvin: number): string =>
  gap!.gigahertz < thermalGigahertz(millikelvin)
    ? 'past the least gap, where the gap has opened to kT'
    : 'at the least gap, which kT does not reach'

/** Where a pause may serve, to three digits; null where the spectrum or the sheet does not say. */
export function pauseAt({ gap, s }: Spectrum, millikelvin: number | null): number | null {
  const place = gap && millikelvin !== null ? pausePlace(gap, s, thermalGigahertz(millikelvin)) : null
  return place !== null && place > 0 && place < 1 ? Number(place.toPrecision(3)) : null
}
