import type { CheckSubject, CheckView, RunSheetSettings, RunSheetState, RunSheetView } from './schemas/run-sheets'

/** How two run sheets differ, field by field. */

type Value = string | number | null

export interface ComparedField {
  field: string
  unit: string
  /** Null where there is none. */
  a: Value
  b: Value
  differs: boolean
}

export interface ComparedGroup {
  title: string
  fields: ComparedField[]
}

export interface ComparedCheck {
  about: CheckSubject
  /** Null where this run sheet has no such check. */
  a: Pick<CheckView, 'verdict' | 'what'> | null
  b: Pick<CheckView, 'verdict' | 'what'> | null
  differs: boolean
}

export interface ComparedSide {
  id: string
  number: number
  name: string
  state: RunSheetState
}

export interface RunSheetComparison {
  a: ComparedSide
  b: ComparedSide
  groups: ComparedGroup[]
  checks: ComparedCheck[]
  /** Strengths by variable, in units of J, where they differ or one side has no such chain. */
  strengths: { differing: { label: string; a: number | null; b: number | null }[]; same: number }
}

/** A run sheet, with the strength of every chain of two or more qubits in the order of the variables. */
export interface ComparedSheet extends RunSheetView {
  strengths: readonly { label: string; strength: number }[]
}

type Reading = readonly [field: string, unit: string, of: (sheet: ComparedSheet) => Value]

/** A schedule in a line: its points, or that it is the straight ramp. */
export const scheduleText = ({ schedule }: Pick<RunSheetSettings, 'schedule'>): string =>
  schedule ? schedule.map(({ microseconds, s }) => `s ${s} at ${microseconds} µs`).join(', ') : 'straight ramp'

const strengthEnd = (pick: (...values: number[]) => number) => (sheet: ComparedSheet) =>
  sheet.strengths.length > 0
    ? sheet.strengths.reduce((end, { strength }) => pick(end, strength), sheet.strengths[0]!.strength)
    : null

const termOf = (part: string) => (sheet: RunSheetView) =>
  sheet.machineTime.parts.find((term) => term.part === part)?.milliseconds ?? null

const GROUPS: readonly { title: string; readings: readonly Reading[] }[] = [
  {
    title: 'Problem, embedding, machine',
    readings: [
      ['Problem', '', ({ problem }) => `P-${problem.number} ${problem.name}`],
      ['Version of the problem', '', ({ ofVersion }) => ofVersion.version],
      ['Embedding', '', ({ embedding }) => `E-${embedding.number}`],
      ['Machine', '', ({ machine }) => machine.name],
      ['Calibration', '', ({ calibration }) => calibration],
      ['Programmed, SHA-256', '', ({ fingerprints }) => fingerprints.programmed],
    ],
  },
  {
    title: 'Settings',
    readings: [
      ['Strength rule', '', ({ rules }) => rules.find(({ selected }) => selected)?.title ?? null],
      ['Factor, or k as entered', '', ({ rules }) => rules.find(({ selected }) => selected)?.value ?? null],
      ['Share h over a chain', '', ({ settings }) => settings.fieldSplit],
      ['Share J over couplers', '', ({ settings }) => settings.interactionCouplers],
      ['Couplers inside a chain', '', ({ settings }) => settings.chainCouplers],
      ['Gauges', '', ({ settings }) => settings.gauges],
      ['Reads', '', ({ settings }) => settings.reads],
      ['Anneal time', 'µs', ({ settings }) => settings.annealMicroseconds],
      ['Schedule', '', ({ settings }) => scheduleText(settings)],
      ['Chosen scale', '', ({ settings }) => settings.scale],
      ['Seed', '', ({ settings }) => settings.seed],
    ],
  },
  {
    title: 'Scale and precision',
    readings: [
      ['Least chain strength', 'J', strengthEnd(Math.min)],
      ['Greatest chain strength', 'J', strengthEnd(Math.max)],
      ['Scale', '', ({ scale }) => scale],
      ['Limited by', '', ({ limitedBy }) => limitedBy],
      ['Fields under 2σ', 'share', ({ precision }) => precision.fieldsUnderTwoSigma],
      ['Couplings under 2σ', 'share', ({ precision }) => precision.couplingsUnderTwoSigma],
      ['Energy noise', 'energy', ({ precision }) => precision.energyNoise],
    ],
  },
  {
    title: 'Machine time, an estimate',
    readings: [
      ['Programming', 'ms', termOf('Programming')],
      ['Anneal', 'ms', termOf('Anneal')],
      ['Read-out', 'ms', termOf('Read-out')],
      ['Delay', 'ms', termOf('Delay')],
      ['Estimate', 'ms', ({ machineTime }) => machineTime.totalMilliseconds],
      ['Price', '', ({ machineTime: { price } }) => price && `${price.amount.toFixed(4)} ${price.currency}`],
    ],
  },
]

const groupOf = (a: ComparedSheet, b: ComparedSheet, readings: readonly Reading[]): ComparedField[] =>
  readings.map(([field, unit, of]) => {
    const [one, other] = [of(a), of(b)]
    return { field, unit, a: one, b: other, differs: one !== other }
  })

function checksOf(a: ComparedSheet, b: ComparedSheet): ComparedCheck[] {
  const subjects = [...new Set([...a.checks, ...b.checks].map(({ about }) => about))]
  const of = ({ checks }: RunSheetView, subject: CheckSubject) => {
    const check = checks.find(({ about }) => about === subject)
    return check ? { verdict: check.verdict, what: check.what } : null
  }
  return subjects.map((about) => {
    const [one, other] = [of(a, about), of(b, about)]
    return { about, a: one, b: other, differs: one?.verdict !== other?.verdict || one?.what !== other?.what }
  })
}

function strengthsOf(a: ComparedSheet, b: ComparedSheet): RunSheetComparison['strengths'] {
  const [one, other] = [a, b].map(({ strengths }) => new Map(strengths.map(({ label, strength }) => [label, strength])))
  const labels = [...new Set([...one!.keys(), ...other!.keys()])]
  const all = labels.map((label) => ({ label, a: one!.get(label) ?? null, b: other!.get(label) ?? null }))
  const differing = all.filter((chain) => chain.a !== chain.b)
  return { differing, same: all.length - differing.length }
}

const sideOf = ({ id, number, name, state }: RunSheetView): ComparedSide => ({ id, number, name, state })

/** Everything two run sheets hold, side by side: pure, and the same whichever is asked for first but for the sides. */
export const comparisonOf = (a: ComparedSheet, b: ComparedSheet): RunSheetComparison => ({
  a: sideOf(a),
  b: sideOf(b),
  groups: GROUPS.map(({ title, readings }) => ({ title, fields: groupOf(a, b, readings) })),
  checks: checksOf(a, b),
  strengths: strengthsOf(a, b),
})
