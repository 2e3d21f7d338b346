import type { Expr, Formula } from './formula'
import { evaluate, isTwofold } from './formula'
import { spokenFormula } from './speech'
import type { Source } from './sources'
import { formatInterval, formatNumber, THIN_SPACE } from '../format'

/** A number that went into a formula. Several values at once are a list. */
export interface HelpInput {
  readonly symbol: string
  readonly name: string
  readonly value: number | readonly number[]
  /** How the value reads; a number is formatted where this is left out. */
  readonly text?: string
  readonly unit?: string
  /** Where it was entered or measured. */
  readonly from?: string
}

/** One formula of an explanation, and how its value reads. */
export interface HelpStep extends Formula {
  readonly name: string
  readonly unit?: string
  /** The value as the page shows it; six digits without. A formula with ± has its two ends. */
  readonly show?: (value: number) => string
  /** Its value is the number asked about; the last step's where none is marked. */
  readonly isAsked?: boolean
}

/** How one kind of number is computed, as a function of what it was computed from. */
export interface HelpEntry<Given> {
  readonly steps?: (given: Given) => readonly HelpStep[]
  readonly inputs: (given: Given) => readonly HelpInput[]
  /** In words: what the symbols mean, or the procedure where no formula says it. */
  readonly method?: (given: Given) => string
  /** The value as shown, of numbers that a procedure gives. */
  readonly result?: (given: Given) => string
  readonly unit?: (given: Given) => string | undefined
  readonly sources: (given: Given) => readonly Source[]
  readonly caution?: (given: Given) => string | undefined
}

export interface ShownStep {
  readonly formula: Formula
  readonly spoken: string
  /** As the page shows it; both ends of an interval. */
  readonly value: string
  readonly unit?: string
  readonly values: readonly number[]
}

export interface Explanation {
  readonly steps: readonly ShownStep[]
  readonly inputs: readonly (HelpInput & { readonly text: string })[]
  readonly method?: string
  /** The number as the page shows it, without its unit. */
  readonly result: string
  readonly unit?: string
  readonly sources: readonly Source[]
  readonly caution?: string
}

/** Differences below this are rounding: a bound that is nought exactly may come out as 1e−17. */
const ROUNDING = 1e12
const withoutRounding = (value: number): number =>
  Math.abs(value) < 1 ? Math.round(value * ROUNDING) / ROUNDING + 0 : value

function valuesOf(expr: Expr, known: Record<string, number | readonly number[]>): number[] {
  const ends = isTwofold(expr) ? ([-1, 1] as const) : ([1] as const)
  return ends.map((sign) => withoutRounding(evaluate(expr, known, sign)))
}

function textOf(values: readonly number[], show: (value: number) => string): string {
  const [low, high] = values
  if (high === undefined) return show(low!)
  // Both ends bear the unit of the format, such as %: it is said once.
  const percent = show(low!).endsWith('%')
  return percent ? `${formatInterval(100 * low!, 100 * high)}${THIN_SPACE}%` : formatInterval(low, high)
}

/** The explanation of one number: formulas worked out from the inputs, one after the other. */
export function explainWith<Given>(entry: HelpEntry<Given>, given: Given): Explanation {
  const inputs = entry.inputs(given)
  const known: Record<string, number | readonly number[]> = {}
  const names: Record<string, string> = {}
  for (const { symbol, value, name } of inputs) {
    known[symbol] = value
    names[symbol] = name
  }
  const asked = entry.steps?.(given) ?? []
  const steps = asked.map(({ symbol, expr, name, show = formatNumber, unit }) => {
    names[symbol] = name
    const values = valuesOf(expr, known)
    if (values.length === 1) known[symbol] = values[0]!
    const value = textOf(values, show)
    return { formula: { symbol, expr }, spoken: spokenFormula({ symbol, expr }, names), value, unit, values }
  })
  const main = steps[asked.findIndex(({ isAsked }) => isAsked)] ?? steps.findLast(({ values }) => values.length === 1)
  return {
    steps,
    inputs: inputs.map((input) => ({ ...input, text: input.text ?? listText(input.value) })),
    method: entry.method?.(given),
    result: entry.result?.(given) ?? main?.value ?? '',
    unit: entry.unit?.(given),
    sources: entry.sources(given),
    caution: entry.caution?.(given),
  }
}

const MOST_LISTED = 8

function listText(value: number | readonly number[]): string {
  if (typeof value === 'number') return formatNumber(value)
  const more = value.length > MOST_LISTED ? `, … (${value.length} in all)` : ''
  return (
    value
      .slice(0, MOST_LISTED)
      .map((item) => formatNumber(item))
      .join(', ') + more
  )
}

/** Ties the type of what is given to an entry. */
export const entry = <Given>(definition: HelpEntry<Given>): HelpEntry<Given> => definition
