import type { Programmed } from '../../shared/engine/programming/programme'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import type { ReturnRow } from '../database/repositories/run-sheets'
import type { Summary } from '../workers/tasks/summarise'
import type { Bench, Programming } from './programming'
import { programmeBench, requireProgrammed } from './programming'
import { summaryOf } from './return-summary'
import { returnRow } from './returns'
import { benchOf } from './run-sheets'

/** A ready return with what it was made from and what it holds. */
export interface LoadedReturn {
  bench: Bench
  programming: Programming
  programmed: Programmed
  summary: Summary
}

export async function loadReturn(app: App, actor: Actor, row: ReturnRow): Promise<LoadedReturn> {
  const bench = await benchOf(app, actor, row)
  const programming = programmeBench(bench, row.settings)
  const programmed = requireProgrammed(programming)
  return { bench, programming, programmed, summary: await summaryOf(app, row, { programmed, ising: bench.ising }) }
}

/** @throws DomainError wrong state, saying why, while there are no samples */
export async function readyRow(app: App, actor: Actor, id: string): Promise<ReturnRow> {
  const row = await returnRow(app, actor, id)
  if (row.status === 'ready') return row
  throw new DomainError(
    'wrong state',
    'return.not-ready',
    `These samples are ${row.status}${row.reason ? `: ${row.reason}` : ''}.`,
  )
}
