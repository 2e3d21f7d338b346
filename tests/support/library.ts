import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import { RUN_SHEET_STATES } from '../../shared/library'
import type { Actor, App } from '../../server/app'
import {
  calibrations,
  embeddings,
  machines,
  problems,
  problemVersions,
  returns,
  runSheets,
} from '../../server/database/schema'

/** What a ferry operator would call its problems. */
const WHAT = ['Berths', 'Deck channels', 'Crew split', 'Ärger am Kai', 'Fuel stops', 'Winter timetable', 'Relief 100 %']
const WHERE = ['of Holm Point', 'of Skarsund', 'for the night boats', 'under_way']
const TAGS = ['winter', 'Deck', 'crew plan', 'trial', 'accepted']
const MACHINES = ['Alder', 'Juniper']
const STATUSES = ['found', 'found', 'found', 'none found', 'running'] as const
const FIRST_MOMENT = Date.parse('2026-01-01T00:00:00Z')
const MINUTE = 60_000
/** Rows sent at once: a statement bears at most 65,535 values. */
const ROWS = 500

type Rows = {
  problems: (typeof problems.$inferInsert)[]
  versions: (typeof problemVersions.$inferInsert)[]
  embeddings: (typeof embeddings.$inferInsert)[]
  sheets: (typeof runSheets.$inferInsert)[]
  returns: (typeof returns.$inferInsert)[]
}

const oneOf = <T>(random: Random, list: readonly T[]): T => list[random.below(list.length)]!

/** One problem with up to three versions and whatever was built on them. */
function addProblem(rows: Rows, { userId, workspaceId }: Actor, k: number, dataBlobId: string, random: Random): void {
  const id = `${workspaceId}-p${k}`
  const at = new Date(FIRST_MOMENT + k * MINUTE)
  const currentVersion = 1 + (random.below(4) === 0 ? random.below(3) : 0)
  const sense = random.below(5) === 0 ? ('max' as const) : ('min' as const)
  const form = random.below(3) === 0 ? ('ising' as const) : ('qubo' as const)
  rows.problems.push({
    id,
    workspaceId,
    number: k + 1,
    name: `${oneOf(random, WHAT)} ${oneOf(random, WHERE)}${random.below(2) ? ` ${random.below(90)}` : ''}`,
    tags: TAGS.filter(() => random.below(4) === 0),
    currentVersion,
    createdBy: userId,
    createdAt: at,
    changedAt: new Date(FIRST_MOMENT + random.below(400) * 1440 * MINUTE),
  })
  for (let version = 1; version <= currentVersion; version++) {
    const variables = 1 + random.below(60)
    const density = random.below(10) / 10
    rows.versions.push({
      problemId: id,
      version,
      form,
      sense,
      variables,
      interactions: Math.round((density * variables * (variables - 1)) / 2),
      dataBlobId,
      fingerprint: `${id} ${version}`,
      source: { fileName: 'p.csv', bytes: 1, sha256: '-' },
      reading: {} as never,
      structure: { density } as never,
      versionBy: userId,
      versionAt: at,
    })
  }
  const made = random.below(4)
  for (let number = 1; number <= made; number++)
    addEmbedding(rows, { userId, workspaceId }, id, number, currentVersion, random)
}

function addEmbedding(
  rows: Rows,
  actor: Actor,
  problemId: string,
  number: number,
  versions: number,
  random: Random,
): void {
  const { userId, workspaceId } = actor
  const id = `${problemId}-e${number}`
  const status = oneOf(random, STATUSES)
  const createdAt = new Date(FIRST_MOMENT + number * MINUTE)
  rows.embeddings.push({
    id,
    workspaceId,
    problemId,
    problemVersion: 1 + random.below(versions),
    machineId: `${workspaceId}-${random.below(2)}`,
    calibration: 1,
    number,
    status,
    method: 'auto',
    seed: 1,
    tries: 1,
    timeLimitSeconds: 1,
    stats:
      status === 'found'
        ? ({ qubitsUsed: 9, chainLength: { max: 1 + random.below(9), mean: 1, min: 1 } } as never)
        : null,
    chosen: number === 1 && status === 'found' && random.below(3) === 0,
    version: '0',
    createdBy: userId,
    createdAt,
  })
  if (status !== 'found' || random.below(3) === 0) return
  const sheetId = `${id}-s`
  rows.sheets.push({
    id: sheetId,
    workspaceId,
    embeddingId: id,
    number: rows.sheets.length + 1,
    name: 'S',
    state: oneOf(random, RUN_SHEET_STATES),
    settings: { reads: 1 } as never,
    machineTimeMilliseconds: 1,
    preparedBy: userId,
    createdAt: new Date(createdAt.getTime() + random.below(3) * MINUTE),
    changedAt: createdAt,
  })
  for (let sample = 1; sample <= random.below(3); sample++)
    rows.returns.push({
      id: `${sheetId}-r${sample}`,
      workspaceId,
      runSheetId: sheetId,
      embeddingId: id,
      number: sample,
      source: 'upload',
      status: 'ready',
      made: {},
      settings: {} as never,
      reads: 1,
      best: random.below(40) / 4 - 5,
      version: '0',
      createdBy: userId,
      createdAt,
    })
}

async function seedMachines({ db }: App, { userId, workspaceId }: Actor): Promise<void> {
  const moment = new Date(FIRST_MOMENT)
  for (const [k, name] of MACHINES.entries()) {
    const id = `${workspaceId}-${k}`
    const family = { kind: 'king' as const, width: 2, height: 2 }
    const row = {
      id,
      workspaceId,
      name,
      family,
      calibration: 1,
      createdBy: userId,
      createdAt: moment,
      changedAt: moment,
    }
    await db.insert(machines).values(row)
    const sheet = {} as never
    const calibration = { machineId: id, number: 1, sheet, qubits: 4, couplers: 6, broke: [], createdBy: userId }
    await db.insert(calibrations).values({ ...calibration, createdAt: moment })
  }
}

/** Fills a workspace with problems in every state of the work; the same for the same seed. */
export async function seedLibrary(app: App, actor: Actor, options: { problems: number; seed: number }): Promise<void> {
  const random = createRandom(options.seed)
  const dataBlobId = await app.blobs.write(Uint8Array.of(1))
  const { db } = app
  await seedMachines(app, actor)
  const rows: Rows = { problems: [], versions: [], embeddings: [], sheets: [], returns: [] }
  for (let k = 0; k < options.problems; k++) addProblem(rows, actor, k, dataBlobId, random)
  await db.transaction(async (tx) => {
    await app.blobs.adopt(tx, dataBlobId)
    for (let k = 0; k < rows.problems.length; k += ROWS)
      await tx.insert(problems).values(rows.problems.slice(k, k + ROWS))
    for (let k = 0; k < rows.versions.length; k += ROWS)
      await tx.insert(problemVersions).values(rows.versions.slice(k, k + ROWS))
    for (let k = 0; k < rows.embeddings.length; k += ROWS)
      await tx.insert(embeddings).values(rows.embeddings.slice(k, k + ROWS))
    for (let k = 0; k < rows.sheets.length; k += ROWS) await tx.insert(runSheets).values(rows.sheets.slice(k, k + ROWS))
    for (let k = 0; k < rows.returns.length; k += ROWS) await tx.insert(returns).values(rows.returns.slice(k, k + ROWS))
  })
}
