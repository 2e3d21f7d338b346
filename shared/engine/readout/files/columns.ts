import { ReadingFault } from '../../formats/format'
import type { Columns } from './reading'

const DEFAULTS = { listedQubits: 8 }

/** "4, 7, 9", at most the first few listed. */
export function listed(names: readonly (string | number)[]): string {
  const shown = names.slice(0, DEFAULTS.listedQubits).join(', ')
  return names.length > DEFAULTS.listedQubits ? `${shown}, … (${names.length} in all)` : shown
}

/** Place of each published number among the run sheet's qubits; −1 for one that it does not use. */
export function placesOf(numbers: readonly number[], { qubitIds }: Columns): Int32Array {
  const placeOf = new Map(qubitIds.map((id, place) => [id, place]))
  return Int32Array.from(numbers, (number) => placeOf.get(number) ?? -1)
}

/** What is wrong with columns of these qubits, in words; empty when each of the run sheet's stands there exactly once. */
export function columnFaults(numbers: readonly number[], { qubitIds }: Columns): string[] {
  const faults: string[] = []
  const wanted = new Set(qubitIds)
  const present = new Set<number>()
  const repeated = new Set<number>()
  for (const number of numbers) {
    if (present.has(number)) repeated.add(number)
    present.add(number)
  }
  const unknown = numbers.filter((number) => !wanted.has(number))
  if (unknown.length > 0) faults.push(`qubits that the run sheet does not use: ${listed(unknown)}`)
  if (repeated.size > 0) faults.push(`columns that occur twice: ${listed([...repeated])}`)
  const missing = qubitIds.filter((id) => !present.has(id))
  if (missing.length > 0) faults.push(`qubits of the run sheet that are missing: ${listed(missing)}`)
  return faults
}

/** Columns of a file that does not name its qubits: as given, or as in the bundle. */
export interface OrderedColumns {
  readonly target: Int32Array
  readonly from: 'given' | 'bundle'
}

/** @throws ReadingFault for an order that does not hold each qubit of the run sheet once */
export function orderedColumns(columns: Columns): OrderedColumns {
  const order = columns.order ?? columns.qubitIds
  const [fault] = columnFaults(order, columns)
  if (fault) throw new ReadingFault(`the order of qubits that was given has ${fault}`)
  return { target: placesOf(order, columns), from: columns.order ? 'given' : 'bundle' }
}
