import type { Programmed } from '../../shared/engine/programming/programme'
import type { ProgrammedView } from '../../shared/schemas/run-sheets'

/** Programmed values by published qubit number. */
export function programmedValues(
  programmed: Programmed,
  qubitIds: readonly number[],
  labels: readonly string[],
): ProgrammedView {
  const { h, J, ends, scale, offset, chainStrength } = programmed
  return {
    h: Object.fromEntries(qubitIds.map((number, p) => [number, h[p]!])),
    J: Array.from(J, (value, c) => [qubitIds[ends[2 * c]!]!, qubitIds[ends[2 * c + 1]!]!, value]),
    scale,
    chainStrength: Object.fromEntries(labels.map((label, i) => [label, chainStrength[i]!])),
    offset,
  }
}

const noteOf = ({ scale, offset }: ProgrammedView): string =>
  `scale ${scale}, offset ${offset}: scale * E_logical = E_physical + offset`

const fieldsOf = ({ h }: ProgrammedView): [number, number, number][] =>
  Object.entries(h).map(([number, value]) => [Number(number), Number(number), value])

/** `a,b,value` lines: a field where both numbers are the same, else a coupling. */
export function programmedCsv(values: ProgrammedView): string {
  const lines = [...fieldsOf(values), ...values.J].map((entry) => `${entry.join(',')}\n`)
  return `# ${noteOf(values)}\n# equal numbers: field h; otherwise coupling J\na,b,value\n${lines.join('')}`
}

/** Matrix Market over qubit numbers from 1: fields on the diagonal, each coupling once below it. */
export function programmedMtx(values: ProgrammedView): string {
  const fields = fieldsOf(values)
  const side = fields.reduce((most, [number]) => Math.max(most, number), 0) + 1
  const lines = [...fields, ...values.J].map(
    ([a, b, value]) => `${Math.max(a, b) + 1} ${Math.min(a, b) + 1} ${value}\n`,
  )
  return `%%MatrixMarket matrix coordinate real symmetric\n% row and column = qubit number + 1; diagonal: h, below it: J once per coupler\n% ${noteOf(values)}\n${side} ${side} ${lines.length}\n${lines.join('')}`
}
