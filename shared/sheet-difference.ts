import { csvCell } from './csv'
import { largestChange } from './engine/machine/energy-change'
import type { LargestChange } from './engine/machine/energy-change'
import type { MachineSheet } from './schemas/machines'

/** A figure of a sheet: one number, the two ends of a range, a word; null where it is not given. */
export type FigureValue = number | readonly [number, number] | string | null

export interface SheetFigure {
  /** As in the sheet's own names. */
  field: string
  label: string
  unit: string
  /** What null means. */
  none: string
  valueOf: (sheet: MachineSheet) => FigureValue
}

const MICROSECONDS = 'µs'

/** Every figure of a sheet but the lists of missing parts and the energy table. */
export const SHEET_FIGURES: readonly SheetFigure[] = [
  { field: 'ranges.h', label: 'h', unit: '', none: '', valueOf: ({ ranges }) => ranges.h },
  { field: 'ranges.J', label: 'J', unit: '', none: '', valueOf: ({ ranges }) => ranges.J },
  {
    field: 'ranges.couplingSum',
    label: 'Coupling sum',
    unit: '',
    none: 'not limited',
    valueOf: ({ ranges }) => ranges.couplingSum,
  },
  { field: 'controlError.h', label: 'σ of h', unit: '', none: '', valueOf: ({ controlError }) => controlError.h },
  { field: 'controlError.J', label: 'σ of J', unit: '', none: '', valueOf: ({ controlError }) => controlError.J },
  timing('programmingMicroseconds', 'Programming'),
  timing('readoutMicroseconds', 'Read-out'),
  timing('delayMicroseconds', 'Delay'),
  timing('annealMinMicroseconds', 'Shortest anneal'),
  timing('annealMaxMicroseconds', 'Longest anneal'),
  { ...timing('slopeMaxPerMicrosecond', 'Steepest slope of s'), unit: 'per µs', none: 'not limited' },
  { ...timing('schedulePointsMax', 'Points of a schedule'), unit: '', none: 'no schedules' },
  {
    field: 'temperatureMillikelvin',
    label: 'Temperature',
    unit: 'mK',
    none: 'not measured',
    valueOf: (sheet) => sheet.temperatureMillikelvin,
  },
  {
    field: 'price.perSecond',
    label: 'Price of a second',
    unit: '',
    none: 'not stated',
    valueOf: ({ price }) => price?.perSecond ?? null,
  },
  {
    field: 'price.currency',
    label: 'Currency',
    unit: '',
    none: 'not stated',
    valueOf: ({ price }) => price?.currency ?? null,
  },
]

function timing(field: keyof MachineSheet['timing'], label: string): SheetFigure {
  return {
    field: `timing.${field}`,
    label,
    unit: MICROSECONDS,
    none: '',
    valueOf: (sheet) => sheet.timing[field],
  }
}

/** A figure that moved. */
export interface FigureChange extends Omit<SheetFigure, 'valueOf'> {
  from: FigureValue
  to: FigureValue
}

/** What one calibration changed against another; qubits and couplers by published number, ascending. */
export interface SheetDifference {
  qubitsLost: number[]
  qubitsRegained: number[]
  /** Between qubits that worked before: those of a lost qubit go without saying. */
  couplersLost: [number, number][]
  /** Between qubits that work now: those of a regained qubit go without saying. */
  couplersRegained: [number, number][]
  figures: FigureChange[]
  energies: EnergyChange | null
}

/** How the energy table moved; the largest changes are null where a column stayed. */
export interface EnergyChange {
  kind: 'given' | 'withdrawn' | 'changed'
  A: LargestChange | null
  B: LargestChange | null
}

const difference = (from: readonly number[], taken: readonly number[]): number[] => {
  const without = new Set(taken)
  return [...new Set(from)].filter((one) => !without.has(one)).sort((a, b) => a - b)
}

/** Numbers of qubits end below 2²⁴, so a pair fits a number exactly. */
const PAIR = 2 ** 24

function couplersOnlyIn(sheet: MachineSheet, other: MachineSheet): [number, number][] {
  const keys = ({ defects }: MachineSheet) => defects.couplers.map(([a, b]) => Math.min(a, b) * PAIR + Math.max(a, b))
  const missing = new Set([...sheet.defects.qubits, ...other.defects.qubits])
  return difference(keys(sheet), keys(other))
    .map((key): [number, number] => [Math.floor(key / PAIR), key % PAIR])
    .filter(([a, b]) => !missing.has(a) && !missing.has(b))
}

function energyChange(before: MachineSheet, now: MachineSheet): EnergyChange | null {
  const [from, to] = [before.energyTable, now.energyTable]
  if (from === null || to === null)
    return from === to ? null : { kind: to === null ? 'withdrawn' : 'given', A: null, B: null }
  const [A, B] = [largestChange(from, to, 'A'), largestChange(from, to, 'B')]
  return A === null && B === null ? null : { kind: 'changed', A, B }
}

const isSame = (a: FigureValue, b: FigureValue): boolean => JSON.stringify(a) === JSON.stringify(b)

/** Compares two sheets part by part; either may be the later one. */
export function sheetDifference(before: MachineSheet, now: MachineSheet): SheetDifference {
  return {
    qubitsLost: difference(now.defects.qubits, before.defects.qubits),
    qubitsRegained: difference(before.defects.qubits, now.defects.qubits),
    couplersLost: couplersOnlyIn(now, before),
    couplersRegained: couplersOnlyIn(before, now),
    figures: SHEET_FIGURES.flatMap(({ valueOf, ...figure }) => {
      const [from, to] = [valueOf(before), valueOf(now)]
      return isSame(from, to) ? [] : [{ ...figure, from, to }]
    }),
    energies: energyChange(before, now),
  }
}

const csvValue = (value: FigureValue, none: string): string =>
  Array.isArray(value) ? value.join(' to ') : value === null ? none : String(value)

/** A difference as CSV: `part,name,from,to,unit`, one changed part or figure a line. */
export function differenceCsv(change: SheetDifference): string {
  const { qubitsLost, qubitsRegained, couplersLost, couplersRegained, figures, energies } = change
  const lost = ['working', 'missing', '']
  const regained = ['missing', 'working', '']
  const rows: string[][] = [
    ['part', 'name', 'from', 'to', 'unit'],
    ...qubitsLost.map((id) => ['qubit', String(id), ...lost]),
    ...qubitsRegained.map((id) => ['qubit', String(id), ...regained]),
    ...couplersLost.map((pair) => ['coupler', pair.join('-'), ...lost]),
    ...couplersRegained.map((pair) => ['coupler', pair.join('-'), ...regained]),
    ...figures.map(({ label, unit, none, from, to }) => [
      'figure',
      label,
      csvValue(from, none),
      csvValue(to, none),
      unit,
    ]),
  ]
  if (energies && energies.kind !== 'changed')
    rows.push(['energy table', '', ...(energies.kind === 'given' ? ['none', 'given'] : ['given', 'none']), ''])
  for (const column of ['A', 'B'] as const) {
    const most = energies?.[column]
    if (most) rows.push(['energy table', `${column} at s = ${most.s}`, String(most.from), String(most.to), 'GHz'])
  }
  return rows.map((row) => `${row.map(csvCell).join(',')}\n`).join('')
}
