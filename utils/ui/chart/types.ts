import type { ColourName, Palette } from '../../../assets/css/tokens'

/** What a page hands to a chart. Numbers only: words on axes go through `categories`. */

export type ChartKind = 'bar' | 'step' | 'line' | 'points' | 'rates'

export interface ChartAxis {
  /** What is measured: `chain strength k`. A count needs no unit beside its name. */
  label: string
  /** Said after the name: `in units of J`, `%`. */
  unit?: string
  scale?: 'linear' | 'log'
  min?: number
  max?: number
  /** Counts: no ticks between whole numbers. */
  whole?: boolean
  /** Names in place of the numbers 0, 1, 2, … */
  categories?: string[]
}

export interface ChartPoint {
  x: number
  y: number
  /** Ends of the interval of y. */
  low?: number
  high?: number
  /** Sets this point apart: the bar below 2σ, the chosen one. */
  tone?: ColourName
  /** Row of a chart of rates: `whi.4`. */
  label?: string
}

export interface ChartSeries {
  name: string
  points: ChartPoint[]
  /** How this series is drawn when it differs from the chart's kind. */
  kind?: Exclude<ChartKind, 'rates'>
  stroke?: 'solid' | 'dashed' | 'dotted'
  /** `hollow` points are drawn as open squares. */
  marker?: 'full' | 'hollow' | 'plus' | 'none'
  tone?: ColourName
  /** Steps that hold from their point on, or up to it; without it each holds around its point. */
  holds?: 'from' | 'up to'
  /** Intervals as a shaded band rather than as bars. */
  band?: boolean
  /** Name written at the point whose x is nearest: a direct label in place of a legend. */
  labelAt?: number
}

/** A line across the plot: a reference optimum, a threshold, the chosen strength. */
export interface ChartRule {
  axis: 'x' | 'y'
  at: number
  label?: string
  tone?: ColourName
  stroke?: 'solid' | 'dashed' | 'dotted'
  /** End of a line across y at which its label stands. */
  labelEnd?: 'left' | 'right'
}

/** A shaded stretch of the x axis. */
export interface ChartSpan {
  from: number
  to: number
  tone?: ColourName
}

export interface ChartInput {
  kind: ChartKind
  title: string
  /** At the right of the title: unit of the values, or what one bar is; the y axis where it is left out. */
  unit?: string
  x: ChartAxis
  y: ChartAxis
  series: ChartSeries[]
  /** Width of one bar in units of x; without it the smallest distance between bars. */
  binWidth?: number
  /** Bars stand for stretches of the x axis and fill them, however few they are. */
  binned?: boolean
  rules?: ChartRule[]
  spans?: ChartSpan[]
}

/** What is drawn, and in which colours. */
export interface ChartLook {
  input: ChartInput
  palette: Palette
}
