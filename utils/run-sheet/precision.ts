import type { DrownedView, StrengthEffectView, ValueCounts } from '#shared/schemas/precision'
import type { RunSheetView } from '#shared/schemas/run-sheets'
import type { HelpCase } from '../help/registry'
import type { ChartPoint, ChartRule, ChartSpan } from '../ui/chart/types'
import { formatNumber, formatSignificant } from '../format'
import { coefficientsHelp, noiseHelp } from './help'

/** How programmed values are drawn over the range that a machine takes. */

/** Of the range, left free beyond its ends, so that their lines can be seen. */
const BEYOND = 0.04
/** Rounding of an edge must not put a bar that ends at 2σ outside. */
const SLACK = 1e-9

export interface ValueChart {
  points: ChartPoint[]
  /** Width of a bar, in programmed units. */
  width: number
  min: number
  max: number
  rules: ChartRule[]
  spans: ChartSpan[]
}

/** One bar for each bin that holds a value; those wholly within ±2σ are set apart. */
function barsOf(counts: readonly number[], [least, greatest]: ValueCounts['range'], sigma: number): ChartPoint[] {
  const width = (greatest - least) / counts.length
  const limit = 2 * sigma * (1 + SLACK)
  return counts.flatMap((count, bin) => {
    if (count === 0) return []
    const [from, to] = [least + bin * width, least + (bin + 1) * width]
    const drowns = -limit <= from && to <= limit
    return [{ x: (from + to) / 2, y: count, ...(drowns ? { tone: 'ochre' as const } : {}) }]
  })
}

/** A range end without the noise of its last digits. */
const ended = (end: number): string => formatSignificant(end, 4)

/** Bars, ends of the range, ±σ as lines and ±2σ as a shaded stretch. */
export function valueChart({ range, sigma, counts }: ValueCounts): ValueChart {
  const [least, greatest] = range
  const beyond = BEYOND * (greatest - least)
  const ends: ChartRule[] = range.map((at) => ({ axis: 'x', at, label: ended(at), tone: 'edge' }))
  const sigmas: ChartRule[] =
    sigma > 0 ? [-sigma, sigma].map((at) => ({ axis: 'x', at, tone: 'ochretext', stroke: 'dotted' })) : []
  return {
    points: barsOf(counts, range, sigma),
    width: (greatest - least) / counts.length,
    min: least - beyond,
    max: greatest + beyond,
    rules: [...ends, ...sigmas],
    spans: sigma > 0 ? [{ from: -2 * sigma, to: 2 * sigma, tone: 'tint' }] : [],
  }
}

/** `whi.4`, or `whi.4 – dun.2` for an interaction. */
export const coefficientName = ({ of }: Pick<DrownedView, 'of'>): string => of.join(' – ')

/** `over 3 qubits`: what a coefficient was shared out to. */
export function partsText({ of, parts }: Pick<DrownedView, 'of' | 'parts'>): string {
  const noun = of.length === 1 ? 'qubit' : 'coupler'
  return `${formatNumber(parts)} ${noun}${parts === 1 ? '' : 's'}`
}

/** How the size over σ of each listed coefficient is computed. */
export function drownedCases(
  drowned: readonly DrownedView[],
  { sigmaH, sigmaJ }: RunSheetView['precision'],
  scale: number,
): HelpCase[] {
  return drowned.map((coefficient) => {
    const kind = coefficient.of.length === 1 ? ('field' as const) : ('coupling' as const)
    const sigma = kind === 'field' ? sigmaH : sigmaJ
    const given = { kind, value: coefficient.value, sigma, scale, smallest: false }
    return { label: coefficientName(coefficient), help: { id: 'coefficientOverSigma', given } }
  })
}

/** `1.5 ×`. */
export const factorText = ({ factor }: Pick<StrengthEffectView, 'factor'>): string => `${formatNumber(factor)} ×`

type EffectFigure = 'scale' | 'share' | 'noise' | 'below'

/** How one column of the table of stronger and weaker chains is computed, a case a factor. */
export function effectCases(
  sheet: RunSheetView,
  effects: readonly StrengthEffectView[],
  figure: EffectFigure,
): HelpCase[] {
  return effects.flatMap((effect) => {
    const { scale, chainsBelowBound: below } = effect
    const label = factorText(effect)
    if (figure === 'below')
      return [{ label, help: { id: 'chainsBelowBound', given: { below, chains: sheet.ising.variables } } }]
    if (scale === 0) return []
    const text = formatSignificant(scale)
    if (figure === 'scale') return [{ label, help: { id: 'scaleAtFactor', given: { factor: effect.factor, text } } }]
    const { help } = figure === 'share' ? coefficientsHelp(sheet.precision, effect) : noiseHelp(sheet, scale)
    return help ? [{ label, help }] : []
  })
}
