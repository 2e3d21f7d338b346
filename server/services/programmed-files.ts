import type { ProgrammedView } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { programmedCsv, programmedMtx, programmedValues } from '../bundle/programmed-texts'
import { programmeBench, requireProgrammed } from './programming'
import { qubitIdsOf } from './qubit-ids'
import { benchOf, runSheetRow } from './run-sheets'

/** Programmed values by published qubit number. */
export async function programmedView(app: App, actor: Actor, id: string): Promise<ProgrammedView> {
  const row = await runSheetRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const programmed = requireProgrammed(programmeBench(bench, row.settings))
  return programmedValues(programmed, qubitIdsOf(bench, programmed), bench.labels)
}

/** The programmed values as a file: `a,b,value` lines, or Matrix Market over numbers from 1; fields on the diagonal. */
export async function programmedFile(
  app: App,
  actor: Actor,
  id: string,
  format: 'csv' | 'mtx',
): Promise<{ fileName: string; text: string }> {
  const { number } = await runSheetRow(app, actor, id)
  const values = await programmedView(app, actor, id)
  return {
    fileName: `RS-${number}-programmed.${format}`,
    text: format === 'csv' ? programmedCsv(values) : programmedMtx(values),
  }
}
