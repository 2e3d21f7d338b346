import type { WorkingGraph } from '../../shared/engine/machine/fabric'
import type { EmbeddingDamage } from '../../shared/schemas/machines'
import { OPEN_STATES } from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import type { Db } from '../database/client'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { foundEmbeddingsOn } from '../database/repositories/embeddings'
import type { MachineRow } from '../database/repositories/machines'
import {
  endBroken,
  findCalibration,
  insertBrokenEmbeddings,
  lockCalibration,
  openBroken,
  updateDamage,
} from '../database/repositories/machines'
import { personOf } from '../database/repositories/problems'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import type { Letter } from '../mail/letter'
import type { BrokenForLetter } from '../mail/letters'
import { brokenLetter } from '../mail/letters'
import type { DamageJudge } from './embedding-damage'
import { damageJudge } from './embedding-damage'
import { tell } from './mail'
import { Overtaken } from './overtaken'

/** An embedding that a calibration broke, with the run sheets on it that are not over. */
export interface Broken {
  embedding: EmbeddingRow
  problem: string
  damage: EmbeddingDamage
  runSheets: RunSheetRow[]
}

/** Judges all embeddings of a machine against a calibration that is about to be saved. */
export class CalibrationReview {
  private readonly judge: DamageJudge
  private readonly verdicts = new Map<string, EmbeddingDamage | null>()

  constructor(
    private readonly app: App,
    private readonly machineId: string,
    working: WorkingGraph,
    ids: Uint32Array,
  ) {
    this.judge = damageJudge(app, working, ids)
  }

  /** Judges those that were not judged yet, as many at a time as there are threads. */
  async judgeAll(): Promise<void> {
    const rows = (await foundEmbeddingsOn(this.app.db, this.machineId)).map(({ embedding }) => embedding)
    const waiting = rows.filter(({ id }) => !this.verdicts.has(id))
    const take = async (): Promise<void> => {
      for (let row = waiting.pop(); row; row = waiting.pop()) this.verdicts.set(row.id, await this.judge(row))
    }
    await Promise.all(Array.from({ length: this.app.compute.threads }, take))
  }

  /**
   * Stores the verdicts in the transaction that saves the calibration.
   * @returns those that it breaks
   * @throws Overtaken when an embedding was found since they were judged
   */
  async store(tx: Db, calibration: number): Promise<Broken[]> {
    const found = await foundEmbeddingsOn(tx, this.machineId)
    if (found.some(({ embedding }) => !this.verdicts.has(embedding.id))) throw new Overtaken()
    const open = new Map((await openBroken(tx, this.machineId)).map((row) => [row.embeddingId, row]))
    const broken: Omit<Broken, 'runSheets'>[] = []
    for (const { embedding, problem } of found) {
      const damage = this.verdicts.get(embedding.id)!
      const before = open.get(embedding.id)
      if (!damage && before) await endBroken(tx, before, calibration)
      else if (damage && before) await updateDamage(tx, before, damage)
      else if (damage) broken.push({ embedding, problem, damage })
    }
    await insertBrokenEmbeddings(
      tx,
      broken.map(({ embedding: { id: embeddingId }, damage }) => ({
        machineId: this.machineId,
        calibration,
        embeddingId,
        damage,
      })),
    )
    return withRunSheets(tx, broken)
  }
}

/** Deleted ones are left out: they are judged only in case they are brought back. */
async function withRunSheets(tx: Db, broken: readonly Omit<Broken, 'runSheets'>[]): Promise<Broken[]> {
  const seen = broken.filter(({ embedding }) => embedding.deletedWith === null)
  const sheets = await runSheetsOfEmbeddings(
    tx,
    seen.map(({ embedding }) => embedding.id),
  )
  const open = sheets.filter(({ state }) => OPEN_STATES.includes(state))
  return seen.map((one) => ({
    ...one,
    runSheets: open.filter(({ embeddingId }) => embeddingId === one.embedding.id),
  }))
}

/** Writes to whoever made a broken embedding or prepared a run sheet on one: one message a person. */
export async function tellBroken(
  app: App,
  tx: Db,
  machine: MachineRow,
  calibration: number,
  broken: readonly Broken[],
): Promise<void> {
  const saved = await findCalibration(tx, machine.id, calibration)
  if (!saved || broken.length === 0) return
  const { name } = await personOf(tx, saved.createdBy)
  const people = new Set(
    broken.flatMap(({ embedding, runSheets }) => [embedding.createdBy, ...runSheets.map((row) => row.preparedBy)]),
  )
  const about = { id: machine.id, name: machine.name, calibration }
  const letters = new Map<string, Letter>()
  for (const id of people)
    letters.set(
      id,
      brokenLetter(
        about,
        name,
        saved.sheet.remark,
        broken.flatMap((one) => concerning(one, id)),
      ),
    )
  await tell(app, tx, { workspaceId: machine.workspaceId, by: saved.createdBy }, letters)
}

/** What of a broken embedding concerns a person: all of it where they made it, else their run sheets. */
function concerning({ embedding, problem, damage, runSheets }: Broken, userId: string): BrokenForLetter[] {
  const own = embedding.createdBy === userId ? runSheets : runSheets.filter(({ preparedBy }) => preparedBy === userId)
  return embedding.createdBy === userId || own.length > 0 ? [{ embedding, problem, damage, runSheets: own }] : []
}

/**
 * Stores with an embedding that is found at an earlier calibration whether the one in force carries it.
 * @throws Overtaken when another calibration was saved since that was looked at
 */
export async function storeVerdict(
  app: App,
  tx: Db,
  { embedding, problem }: { embedding: EmbeddingRow; problem: string },
  { machine, damage }: { machine: MachineRow; damage: EmbeddingDamage | null },
): Promise<void> {
  const { calibration } = machine
  if ((await lockCalibration(tx, machine.id)) !== calibration) throw new Overtaken()
  if (!damage) return
  await insertBrokenEmbeddings(tx, [{ machineId: machine.id, calibration, embeddingId: embedding.id, damage }])
  await tellBroken(app, tx, machine, calibration, await withRunSheets(tx, [{ embedding, problem, damage }]))
}
