import type { App } from '../../app'
import type { WorkRow } from '../../database/repositories/workspace-rows'
import { blobsOf, WORK_TABLE_NAMES } from '../../database/repositories/workspace-rows'
import type { ArchiveRows } from './archive-rows'
import { ArrayChecks } from './check-arrays'
import type { Archive } from './open-archive'
import { notReadable } from './read-rows'

export interface Taking {
  signal: AbortSignal
  /** How many of the steps are done. */
  tell(done: number, total: number): void
}

export interface TakenArrays {
  /** Blobs here by their names in the archive; nothing refers to them yet. */
  readonly blobIds: ReadonlyMap<string, string>
  /** Numbers of frozen run sheets whose values come out otherwise here. */
  readonly otherwise: readonly number[]
}

const byId = (rows: readonly WorkRow[]) => new Map(rows.map((row) => [row.id as string, row]))
const keyed = (rows: readonly WorkRow[], id: string, number: string) =>
  new Map(rows.map((row) => [`${String(row[id])} ${String(row[number])}`, row]))

function checksOf(app: App, archive: Archive, rows: ArchiveRows): ArrayChecks {
  const [machines, calibrations] = [byId(rows.machines), keyed(rows.calibrations, 'machineId', 'number')]
  const versions = keyed(rows.problemVersions, 'problemId', 'version')
  return new ArrayChecks(app, {
    bytes: (blobId) => archive.blob(blobId),
    machine: (id) => machines.get(id),
    calibration: (machineId, number) => calibrations.get(`${machineId} ${number}`),
    problemVersion: (problemId, version) => versions.get(`${problemId} ${version}`),
  })
}

/** One step for each row whose arrays are checked. */
function stepsOf(checks: ArrayChecks, rows: ArchiveRows, otherwise: number[]): (() => Promise<void>)[] {
  const embeddings = byId(rows.embeddings)
  const embeddingOf = (row: WorkRow): WorkRow => embeddings.get(row.embeddingId as string)!
  const agreed = async (row: WorkRow): Promise<void> => {
    if (row.fingerprint === null || (await checks.isAsAgreed(row, embeddingOf(row)))) return
    otherwise.push(row.number as number)
  }
  return [
    ...rows.machines.map((row) => () => checks.machine(row)),
    ...rows.calibrations.map((row) => () => checks.calibration(row)),
    ...rows.problemVersions.map((row) => () => checks.problemVersion(row)),
    ...rows.reductions.map((row) => () => checks.reduction(row)),
    ...rows.referenceOptima.map((row) => () => checks.reference(row)),
    ...rows.embeddings.map((row) => () => checks.embedding(row)),
    ...rows.runSheets.map((row) => () => agreed(row)),
    ...rows.returns.map((row) => () => checks.samples(row, embeddingOf(row))),
  ]
}

/** Checks every array of an archive against its rows and stores it, for the transaction that stores the rows. */
export async function takeArrays(
  app: App,
  archive: Archive,
  rows: ArchiveRows,
  { signal, tell }: Taking,
): Promise<TakenArrays> {
  const otherwise: number[] = []
  const steps = stepsOf(checksOf(app, archive, rows), rows, otherwise)
  const ids = new Set(WORK_TABLE_NAMES.flatMap((name) => rows[name].flatMap((row) => blobsOf(name, row))))
  const total = steps.length + ids.size
  let done = 0
  for (const step of steps) {
    signal.throwIfAborted()
    await step()
    tell(++done, total)
  }
  const blobIds = new Map<string, string>()
  for (const id of ids) {
    signal.throwIfAborted()
    if (!Object.hasOwn(archive.manifest.blobs, id)) throw notReadable(`the array ${id.slice(0, 100)} is missing`)
    blobIds.set(id, await app.blobs.write(await archive.blob(id)))
    tell(++done, total)
  }
  return { blobIds, otherwise }
}
