import { formatDefectText, parseDefectText } from '#shared/engine/machine/defects'
import type { Calibrate, MachineSheet } from '#shared/schemas/machines'
import type { Issue } from '#shared/errors'

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
  | 'temperature'

/** The sheet as typed: null where a figure was left empty, NaN where it cannot be read. */
export type SheetDraft = Record<SheetField, number | null> & {
  defects: string
  hasCouplingSum: boolean
  remark: string
}

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
}

const TIME = { unit: 'µs', least: 0, most: 1e9 }

export const SHEET_FIELDS: Record<SheetField, FieldText> = {
  hLow: {
    label: 'Lowest h',
    hint: 'Most negative field that can be programmed; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.h',
  },
  hHigh: {
    label: 'Highest h',
    hint: 'Most positive field that can be programmed; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.h',
  },
  JLow: {
    label: 'Lowest J',
    hint: 'Strongest ferromagnetic coupling: it bounds the chain strength; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.J',
  },
  JHigh: {
    label: 'Highest J',
    hint: 'Strongest antiferromagnetic coupling; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.J',
  },
  sumLow: {
    label: 'Lowest sum',
    hint: 'Least sum of all J at one qubit; below 0.',
    least: -Infinity,
    most: 0,
    open: 'most',
    path: 'ranges.couplingSum',
  },
  sumHigh: {
    label: 'Highest sum',
    hint: 'Greatest sum of all J at one qubit; above 0.',
    least: 0,
    most: Infinity,
    open: 'least',
    path: 'ranges.couplingSum',
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
}

export const SHEET_START: SheetDraft = {
  defects: '',
  hLow: -1,
  hHigh: 1,
  JLow: -1,
  JHigh: 1,
  hasCouplingSum: false,
  sumLow: null,
  sumHigh: null,
  sigmaH: 0,
  sigmaJ: 0,
  programming: 10_000,
  readout: 100,
  delay: 20,
  annealMin: 1,
  annealMax: 2000,
  temperature: null,
  remark: '',
}

/** The draft that changes a sheet in force; the remark starts empty, since it is about the change. */
export function sheetDraftOf({
  defects,
  ranges,
  controlError,
  timing,
  temperatureMillikelvin,
}: MachineSheet): SheetDraft {
  return {
    defects: formatDefectText(defects),
    hLow: ranges.h[0],
    hHigh: ranges.h[1],
    JLow: ranges.J[0],
    JHigh: ranges.J[1],
    hasCouplingSum: ranges.couplingSum !== null,
    sumLow: ranges.couplingSum?.[0] ?? null,
    sumHigh: ranges.couplingSum?.[1] ?? null,
    sigmaH: controlError.h,
    sigmaJ: controlError.J,
    programming: timing.programmingMicroseconds,
    readout: timing.readoutMicroseconds,
    delay: timing.delayMicroseconds,
    annealMin: timing.annealMinMicroseconds,
    annealMax: timing.annealMaxMicroseconds,
    temperature: temperatureMillikelvin,
    remark: '',
  }
}

const isSum = (field: SheetField): boolean => field === 'sumLow' || field === 'sumHigh'

function problemOf(field: SheetField, value: number | null): string | undefined {
  const { label, least, most, open, optional } = SHEET_FIELDS[field]
  if (value === null) return optional ? undefined : `${label} is not given. Write a number.`
  if (Number.isNaN(value)) return `${label} is not a number. Use digits and a point for decimals.`
  if (value < least || (open === 'least' && value === least))
    return `${label} must be ${open === 'least' ? 'above' : 'at least'} ${least}.`
  if (value > most || (open === 'most' && value === most))
    return `${label} must be ${open === 'most' ? 'below' : 'at most'} ${most}.`
  return undefined
}

export type SheetProblems = Partial<Record<SheetField, string>>

/** What is wrong with the figures, by field. */
export function sheetProblems(draft: SheetDraft): SheetProblems {
  const problems: SheetProblems = {}
  for (const field of Object.keys(SHEET_FIELDS) as SheetField[]) {
    if (isSum(field) && !draft.hasCouplingSum) continue
    const problem = problemOf(field, draft[field])
    if (problem) problems[field] = problem
  }
  if (!problems.annealMin && !problems.annealMax && draft.annealMin! > draft.annealMax!)
    problems.annealMax = 'The longest anneal is shorter than the shortest.'
  return problems
}

/** The request body of a draft without problems; entries of the defect text that cannot be read are left out. */
export function sheetBody(draft: SheetDraft): Required<Calibrate> {
  const { qubits, couplers } = parseDefectText(draft.defects)
  const figure = (field: SheetField): number => draft[field] ?? 0
  return {
    defects: { qubits, couplers },
    ranges: {
      h: [figure('hLow'), figure('hHigh')],
      J: [figure('JLow'), figure('JHigh')],
      couplingSum: draft.hasCouplingSum ? [figure('sumLow'), figure('sumHigh')] : null,
    },
    controlError: { h: figure('sigmaH'), J: figure('sigmaJ') },
    timing: {
      programmingMicroseconds: figure('programming'),
      readoutMicroseconds: figure('readout'),
      delayMicroseconds: figure('delay'),
      annealMinMicroseconds: figure('annealMin'),
      annealMaxMicroseconds: figure('annealMax'),
      slopeMaxPerMicrosecond: null,
      schedulePointsMax: null,
    },
    temperatureMillikelvin: draft.temperature,
    energyTable: null,
    price: null,
    remark: draft.remark,
  }
}

/** The line (from 1) of every qubit and coupler of a defect text, in the order of `parseDefectText`. */
function defectLines(text: string): { qubits: number[]; couplers: number[] } {
  const lines = { qubits: [] as number[], couplers: [] as number[] }
  text.split(/\r\n|\r|\n/).forEach((line, k) => {
    const { qubits, couplers } = parseDefectText(line)
    lines.qubits.push(...qubits.map(() => k + 1))
    lines.couplers.push(...couplers.map(() => k + 1))
  })
  return lines
}

/** The server's issues in the words of the form: entries of the defect list by line, figures by their label. */
export function issuesInForm(issues: readonly Issue[], defects: string): Issue[] {
  const lines = defectLines(defects)
  return issues.map((issue) => {
    const entry = /^defects\.(qubits|couplers)\.(\d+)/.exec(issue.path ?? '')
    if (entry) return { line: lines[entry[1] as 'qubits' | 'couplers'][Number(entry[2])], message: issue.message }
    const field = Object.values(SHEET_FIELDS).find(({ path }) => issue.path?.startsWith(path))
    return { path: field?.label ?? issue.path, message: issue.message }
  })
}
