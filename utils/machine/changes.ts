import type { MachineSheet } from '#shared/schemas/machines'
import { formatNumber } from '../format'
import { rangeText, sigmaText } from './facts'

/** What one calibration changed against the one before. */
export interface SheetChanges {
  qubitsLost: number[]
  qubitsBack: number[]
  couplersLost: string[]
  couplersBack: string[]
  /** `σ of h 0.021 → 0.020`. */
  figures: { label: string; from: string; to: string; unit: string }[]
}

const difference = <T>(from: readonly T[], taken: readonly T[]): T[] => {
  const without = new Set(taken)
  return from.filter((one) => !without.has(one))
}

const couplersOf = ({ defects }: MachineSheet): string[] => defects.couplers.map(([a, b]) => `${a}\u2013${b}`)

const temperature = (value: number | null): string => (value === null ? 'not measured' : formatNumber(value))

function figuresOf({ ranges, controlError, timing, temperatureMillikelvin }: MachineSheet) {
  return [
    ['h', rangeText(ranges.h), ''],
    ['J', rangeText(ranges.J), ''],
    ['Coupling sum', ranges.couplingSum ? rangeText(ranges.couplingSum) : 'not limited', ''],
    ['σ of h', sigmaText(controlError.h), ''],
    ['σ of J', sigmaText(controlError.J), ''],
    ['Programming', formatNumber(timing.programmingMicroseconds), 'µs'],
    ['Read-out', formatNumber(timing.readoutMicroseconds), 'µs'],
    ['Delay', formatNumber(timing.delayMicroseconds), 'µs'],
    ['Shortest anneal', formatNumber(timing.annealMinMicroseconds), 'µs'],
    ['Longest anneal', formatNumber(timing.annealMaxMicroseconds), 'µs'],
    ['Temperature', temperature(temperatureMillikelvin), 'mK'],
  ] as const
}

/** Compares two sheets part by part. */
export function sheetChanges(before: MachineSheet, now: MachineSheet): SheetChanges {
  const earlier = figuresOf(before)
  return {
    qubitsLost: difference(now.defects.qubits, before.defects.qubits),
    qubitsBack: difference(before.defects.qubits, now.defects.qubits),
    couplersLost: difference(couplersOf(now), couplersOf(before)),
    couplersBack: difference(couplersOf(before), couplersOf(now)),
    figures: figuresOf(now).flatMap(([label, to, unit], k) => {
      const from = earlier[k]![1]
      return from === to ? [] : [{ label, from, to, unit }]
    }),
  }
}

/** `139, 399 and 3 more`. */
export function listText(names: readonly (number | string)[], shown = 8): string {
  const rest = names.length - shown
  return rest > 0 ? `${names.slice(0, shown).join(', ')} and ${rest} more` : names.join(', ')
}
