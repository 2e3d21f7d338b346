import { formatDefectText, parseDefectText } from '#shared/engine/machine/defects'
import { formatEnergyTable, parseEnergyText } from '#shared/engine/machine/energy-text'
import type { Calibrate, MachineSheet } from '#shared/schemas/machines'
import { formatCount } from '../format'
import type { SheetField } from './sheet-fields'
import { SHEET_FIELDS } from './sheet-fields'

/** The sheet as typed: null where a figure was left empty, NaN where it cannot be read. */
export type SheetDraft = Record<SheetField, number | null> & {
  defects: string
  hasCouplingSum: boolean
  energyTable: string
  currency: string
  remark: string
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
  slopeMax: null,
  schedulePoints: null,
  temperature: null,
  energyTable: '',
  price: null,
  currency: '',
  remark: '',
}

/** The draft that changes a sheet in force; the remark starts empty, since it is about the change. */
export function sheetDraftOf({
  defects,
  ranges,
  controlError,
  timing,
  temperatureMillikelvin,
  energyTable,
  price,
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
    slopeMax: timing.slopeMaxPerMicrosecond,
    schedulePoints: timing.schedulePointsMax,
    temperature: temperatureMillikelvin,
    energyTable: energyTable ? formatEnergyTable(energyTable) : '',
    price: price?.perSecond ?? null,
    currency: price?.currency ?? '',
    remark: '',
  }
}

const isSum = (field: SheetField): boolean => field === 'sumLow' || field === 'sumHigh'

function problemOf(field: SheetField, value: number | null): string | undefined {
  const { label, least, most, open, optional, whole } = SHEET_FIELDS[field]
  if (value === null) return optional ? undefined : `${label} is not given. Write a number.`
  if (Number.isNaN(value)) return `${label} is not a number. Use digits and a point for decimals.`
  if (!Number.isFinite(value)) return `${label} is beyond the numbers that can be kept.`
  if (whole && !Number.isInteger(value)) return `${label} must be a whole number.`
  if (value < least || (open === 'least' && value === least))
    return `${label} must be ${open === 'least' ? 'above' : 'at least'} ${least}.`
  if (value > most || (open === 'most' && value === most))
    return `${label} must be ${open === 'most' ? 'below' : 'at most'} ${most}.`
  return undefined
}

export type SheetProblems = Partial<Record<SheetField | 'currency' | 'energyTable', string>>

const currencyOf = ({ currency }: SheetDraft): string => currency.trim().toUpperCase()

function energyProblem(text: string): string | undefined {
  const { rejected } = parseEnergyText(text)
  if (rejected.length === 0) return undefined
  return `The energy table has ${formatCount(rejected.length, 'wrong line', 'things wrong with it')}: correct them, or empty the field.`
}

/** What is wrong with the sheet as typed, by field. */
export function sheetProblems(draft: SheetDraft): SheetProblems {
  const problems: SheetProblems = {}
  for (const field of Object.keys(SHEET_FIELDS) as SheetField[]) {
    if (isSum(field) && !draft.hasCouplingSum) continue
    const problem = problemOf(field, draft[field])
    if (problem) problems[field] = problem
  }
  if (!problems.annealMin && !problems.annealMax && draft.annealMin! > draft.annealMax!)
    problems.annealMax = 'The longest anneal is shorter than the shortest.'
  if (draft.price !== null && !/^[A-Z]{3}$/.test(currencyOf(draft)))
    problems.currency = 'The currency is missing. Write its three letters, such as EUR.'
  const energy = energyProblem(draft.energyTable)
  if (energy) problems.energyTable = energy
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
      slopeMaxPerMicrosecond: draft.slopeMax,
      schedulePointsMax: draft.schedulePoints,
    },
    temperatureMillikelvin: draft.temperature,
    energyTable: parseEnergyText(draft.energyTable).table,
    price: draft.price === null ? null : { perSecond: draft.price, currency: currencyOf(draft) },
    remark: draft.remark,
  }
}
