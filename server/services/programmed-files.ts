import type { ProgrammedView } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { programmeBench, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'

/** Programmed values by published qubit number. */
export async function programmedView(app: App, actor: Actor, id: string): Promise<ProgrammedView> {
  const row = await runSheetRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const programmed = requireProgrammed(programmeBench(bench, row.settings))
  const ids = Array.from(programmed.qubits, (q) => bench.machine.fabric.ids[q]!)
  return {
    h: Object.fromEntries(ids.map((number, p) => [number, programmed.h[p]!])),
    J: Array.from(programmed.J, (value, c) => [
      ids[programmed.ends[2 * c]!]!,
      ids[programmed.ends[2 * c + 1]!]!,
      value,
    ]),
    scale: programmed.scale,
    chainStrength: Object.fromEntries(bench.labels.map((label, i) => [label, programmed.chainStrength[i]!])),
    offset: programmed.offset,
  }
}

/** The programmed values as a file: `a,b,value` lines, or Matrix Market over numbers from 1; fields on the diagonal. */
export async function programmedFile(
  app: App,
  actor: Actor,
  id: string,
  format: 'csv' | 'mtx',
): Promise<{ fileName: string; text: string }> {
  const row = await runSheetRow(app, actor, id)
  const { h, J, scale, offset } = await programmedView(app, actor, id)
  const fields = Object.entries(h).map(([number, value]) => [Number(number), Number(number), value] as const)
  const entries = [...fields, ...J]
  const note = `scale ${scale}, offset ${offset}: scale * E_logical = E_physical + offset`
  if (format === 'csv')
    return {
      fileName: `RS-${row.number}-programmed.csv`,
      text: `# ${note}\n# equal numbers: field h; otherwise coupling J\na,b,value\n${entries.map((entry) => `${entry.join(',')}\n`).join('')}`,
    }
  const side = fields.reduce((most, [number]) => Math.max(most, number), 0) + 1
  const lines = entries.map(([a, b, value]) => `${Math.max(a, b) + 1} ${Math.min(a, b) + 1} ${value}\n`)
  return {
    fileName: `RS-${row.number}-programmed.mtx`,
    text: `%%MatrixMarket matrix coordinate real symmetric\n% row and column = qubit number + 1; diagonal: h, below it: J once per coupler\n% ${note}\n${side} ${side} ${lines.length}\n${lines.join('')}`,
  }
}
