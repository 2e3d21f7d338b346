import type { EnergyChange, FigureChange, FigureValue, SheetDifference } from '#shared/sheet-difference'
import { formatCount, formatNumber } from '../format'
import { rangeText, sigmaText } from './facts'

/** How a change of a calibration reads. */

/** A moved figure in words: `σ of h`, `0.021`, `0.020`. */
export interface FigureText {
  label: string
  from: string
  to: string
  unit: string
}

function valueText(value: FigureValue, { field, none }: FigureChange): string {
  if (value === null) return none
  if (typeof value === 'string') return value
  if (typeof value === 'number') return field.startsWith('controlError') ? sigmaText(value) : formatNumber(value)
  return rangeText(value)
}

export const figureText = (change: FigureChange): FigureText => ({
  label: change.label,
  unit: change.unit,
  from: valueText(change.from, change),
  to: valueText(change.to, change),
})

/** `17–42`. */
export const couplerText = ([a, b]: readonly [number, number]): string => `${a}\u2013${b}`

/** Parts lost and regained, those of which there are any, with their names. */
export const partChanges = (change: SheetDifference) =>
  [
    { what: `${formatCount(change.qubitsLost.length, 'qubit')} lost`, names: change.qubitsLost },
    { what: `${formatCount(change.qubitsRegained.length, 'qubit')} regained`, names: change.qubitsRegained },
    {
      what: `${formatCount(change.couplersLost.length, 'coupler')} lost`,
      names: change.couplersLost.map(couplerText),
    },
    {
      what: `${formatCount(change.couplersRegained.length, 'coupler')} regained`,
      names: change.couplersRegained.map(couplerText),
    },
  ].filter(({ names }) => names.length > 0)

/** What the energy table did, a sentence or clause each. */
export function energyTexts(change: EnergyChange | null): string[] {
  if (change === null) return []
  if (change.kind === 'given') return ['Energy table given']
  if (change.kind === 'withdrawn') return ['Energy table withdrawn']
  return (['A', 'B'] as const).flatMap((column) => {
    const most = change[column]
    if (!most) return []
    const ends = `${formatNumber(most.from, { significant: 4 })} → ${formatNumber(most.to, { significant: 4 })} GHz`
    return [`${column} differs most at s = ${formatNumber(most.s, { significant: 3 })}: ${ends}`]
  })
}

export const isUnchanged = (change: SheetDifference): boolean =>
  partChanges(change).length === 0 && change.figures.length === 0 && change.energies === null

/** `139, 399 and 3 more`. */
export function listText(names: readonly (number | string)[], shown = 8): string {
  const rest = names.length - shown
  return rest > 0 ? `${names.slice(0, shown).join(', ')} and ${rest} more` : names.join(', ')
}
