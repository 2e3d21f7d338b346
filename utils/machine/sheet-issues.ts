import { parseDefectText } from '#shared/engine/machine/defects'
import type { Issue } from '#shared/errors'
import type { SheetProblems } from './sheet'
import type { SheetField } from './sheet-fields'
import { SHEET_FIELDS } from './sheet-fields'

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

type PlacedField = SheetField | 'currency' | 'energyTable'

const PLACES = [
  ...Object.entries(SHEET_FIELDS).map(([field, { label, path }]) => ({ field: field as PlacedField, label, path })),
  { field: 'currency' as const, label: 'Currency', path: 'price.currency' },
  { field: 'energyTable' as const, label: 'Energy table', path: 'energyTable' },
]

const placeOf = (path = '') => PLACES.find((place) => path === place.path || path.startsWith(`${place.path}.`))

/** The server's issues in the words of the form: entries of the defect list by line, figures by their label. */
export function issuesInForm(issues: readonly Issue[], defects: string): Issue[] {
  const lines = defectLines(defects)
  return issues.map((issue) => {
    const entry = /^defects\.(qubits|couplers)\.(\d+)/.exec(issue.path ?? '')
    if (entry) return { line: lines[entry[1] as 'qubits' | 'couplers'][Number(entry[2])], message: issue.message }
    return { path: placeOf(issue.path)?.label ?? issue.path, message: issue.message }
  })
}

/** The server's issues under the fields that they are about. */
export function refusedFields(issues: readonly Issue[]): SheetProblems {
  const refused: SheetProblems = {}
  for (const { path, message } of issues) {
    const place = placeOf(path)
    if (place) refused[place.field] ??= `${place.label}: ${message}.`
  }
  return refused
}
