/** Every figure of the sheet that is typed as one number: what it is for, its unit and its bounds. */
export type SheetField =
  | 'hLow'
  | 'hHigh'
  | 'JLow'
  | 'JHigh'
  | 'sumLow'
  | 'sumHigh'
  | 'sigmaH'
  | 'sigmaJ'
  | 'programming'
  | 'readout'
  | 'delay'
  | 'annealMin'
  | 'annealMax'
  | 'slopeMax'
  | 'schedulePoints'
  | 'temperature'
  | 'price'

export interface FieldText {
  label: string
  unit?: string
  /** What the figure is for, and its bounds. */
  hint: string
  least: number
  most: number
  /** The least or the most itself is refused. */
  open?: 'least' | 'most'
  /** The server's name of the figure, as it stands in the paths of its issues. */
  path: string
  optional?: boolean
  whole?: boolean
}

const TIME = { unit: 'µs', least: 0, most: 1e9 }

export const SHEET_FIELDS: Record<SheetField, FieldText> = {
  hLow: {
    label: 'Lowest h',
    hint: 'Most negative field that can be programmed; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.h.0',
  },
  hHigh: {
    label: 'Highest h',
    hint: 'Most positive field that can be programmed; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.h.1',
  },
  JLow: {
    label: 'Lowest J',
    hint: 'Strongest ferromagnetic coupling: it bounds the chain strength; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.J.0',
  },
  JHigh: {
    label: 'Highest J',
    hint: 'Strongest antiferromagnetic coupling; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.J.1',
  },
  sumLow: {
    label: 'Lowest sum',
    hint: 'Least sum of all J at one qubit; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.couplingSum.0',
  },
  sumHigh: {
    label: 'Highest sum',
    hint: 'Greatest sum of all J at one qubit; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.couplingSum.1',
  },
  sigmaH: {
    label: 'σ of h',
    hint: 'Standard deviation of a programmed field: tells which fields drown in it; 0 to 10.',
    least: 0,
    most: 10,
    path: 'controlError.h',
  },
  sigmaJ: {
    label: 'σ of J',
    hint: 'Standard deviation of a programmed coupling; 0 to 10.',
    least: 0,
    most: 10,
    path: 'controlError.J',
  },
  programming: {
    ...TIME,
    label: 'Programming',
    hint: 'Once for each gauge, part of the estimate of machine time; 0 or more.',
    path: 'timing.programmingMicroseconds',
  },
  readout: {
    ...TIME,
    label: 'Read-out',
    hint: 'For each read; 0 or more.',
    path: 'timing.readoutMicroseconds',
  },
  delay: {
    ...TIME,
    label: 'Delay',
    hint: 'Rest between reads; 0 or more.',
    path: 'timing.delayMicroseconds',
  },
  annealMin: {
    ...TIME,
    label: 'Shortest anneal',
    hint: 'Run sheets with a shorter one are refused; 0 or more.',
    path: 'timing.annealMinMicroseconds',
  },
  annealMax: {
    ...TIME,
    label: 'Longest anneal',
    hint: 'Run sheets with a longer one are refused; not below the shortest.',
    path: 'timing.annealMaxMicroseconds',
  },
  slopeMax: {
    label: 'Steepest slope',
    unit: '1/µs',
    hint: 'Most that s may change in a microsecond of a schedule; above 0. Leave it empty where there is no such limit.',
    least: 0,
    most: 1e6,
    open: 'least',
    path: 'timing.slopeMaxPerMicrosecond',
    optional: true,
  },
  schedulePoints: {
    label: 'Schedule points',
    hint: 'Most points of a schedule, first and last included; 2 to 1 000. Leave it empty where schedules cannot be given.',
    least: 2,
    most: 1000,
    path: 'timing.schedulePointsMax',
    optional: true,
    whole: true,
  },
  temperature: {
    label: 'Temperature',
    unit: 'mK',
    hint: 'Of the chip, as measured; above 0. Leave it empty where nobody has measured it.',
    least: 0,
    most: 1e6,
    open: 'least',
    path: 'temperatureMillikelvin',
    optional: true,
  },
  price: {
    label: 'Price of a second',
    hint: 'Of machine time, for what a run sheet costs; 0 or more. Leave it empty where time is not paid for.',
    least: 0,
    most: 1e9,
    path: 'price.perSecond',
    optional: true,
  },
}
