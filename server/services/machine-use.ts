import type { MachineUse, MachineUseItem, MachineUseQuery } from '../../shared/schemas/machine-use'
import type { Actor, App } from '../app'
import { brokenAt, embeddingsUpTo, uploadsOf } from '../database/repositories/machine-use'
import { readPage } from '../database/repositories/pages'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { calibratedMachine } from './machine-graphs'

const isOpen = ({ state }: RunSheetRow): boolean => state !== 'returned' && state !== 'closed'

/** The embeddings that stand on a machine at a calibration, with how much of it each takes; newest first. */
export async function machineUse(app: App, actor: Actor, id: string, query: MachineUseQuery): Promise<MachineUse> {
  const { calibration } = await calibratedMachine(app, actor, id, query.calibration)
  const { items: rows, nextCursor } = await readPage(
    query,
    (place) => embeddingsUpTo(app.db, id, calibration.number, place),
    (row) => row,
  )
  const ids = rows.map(({ embedding }) => embedding.id)
  const broken = await brokenAt(app.db, id, calibration.number)
  const uploads = await uploadsOf(app.db, ids)
  const sheets = await runSheetsOfEmbeddings(app.db, ids)
  const items = rows.flatMap(({ embedding, problem, by }): MachineUseItem[] => {
    if (!embedding.stats) return []
    const { qubitsUsed, chainLength } = embedding.stats
    const open = sheets.filter((sheet) => sheet.embeddingId === embedding.id && isOpen(sheet))
    return [
      {
        id: embedding.id,
        number: embedding.number,
        problem,
        calibration: embedding.calibration,
        brokenSince: broken.get(embedding.id) ?? null,
        qubitsUsed,
        share: calibration.qubits > 0 ? qubitsUsed / calibration.qubits : 0,
        longestChain: chainLength.max,
        chosen: embedding.chosen,
        openRunSheets: open.map((sheet) => ({ id: sheet.id, number: sheet.number })),
        ...(uploads.get(embedding.id) ?? { returns: 0, reads: 0 }),
        by,
        madeAt: embedding.createdAt.toISOString(),
      },
    ]
  })
  return { calibration: calibration.number, workingQubits: calibration.qubits, items, nextCursor }
}
