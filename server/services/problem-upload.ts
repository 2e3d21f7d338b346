import { createHash, randomUUID } from 'node:crypto'
import type { FileReading } from '../../shared/engine/formats/format'
import type { Problem } from '../../shared/engine/problem/problem'
import type { StructureReport } from '../../shared/engine/problem/structure'
import { DomainError } from '../../shared/errors'
import { nameFrom } from '../../shared/schemas/common'
import type { ProblemSource } from '../../shared/schemas/problem-versions'
import type { UploadedProblem, UploadProblem } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertProblem } from '../database/repositories/problems'
import type { ProblemData } from './problem-data'
import { packProblem } from './problem-data'
import { readingView, rejectedLines, unreadable, warningsOf } from './problem-reading'
import { keepRejected } from './rejected-lines'
import { signed, signOf } from './sense'

export interface UploadedFile {
  name: string
  bytes: Uint8Array
}

/** A file as it was read; nothing is saved yet. */
export interface ReadUpload {
  view: UploadedProblem
  data: ProblemData
  source: ProblemSource
  /** All rejected lines as CSV. */
  rejectedList: string
  /** Why it cannot be saved unless the lines that could not be read are left out. */
  incomplete: DomainError | null
}

/** What a long reading tells while it goes on, and how it is ended early. */
export interface ReadingWatch {
  readonly onProgress?: (bytes: number) => void
  readonly signal?: AbortSignal
}

/**
 * The file of an upload: sent, or kept from an earlier look at it.
 * @throws DomainError when there is neither, or it is kept no longer
 */
export function uploadedFile(
  app: App,
  actor: Actor,
  sent: UploadedFile | null,
  kept: string | undefined,
): UploadedFile {
  if (sent) return sent
  if (kept !== undefined) return app.uploads.file(actor, kept)
  throw new DomainError('unreadable', 'upload.file', 'The form has no file. Send it as the part named “file”.')
}

/** Reads a file, and saves it as a problem unless only the preview was asked for. */
export async function uploadProblem(
  app: App,
  actor: Actor,
  file: UploadedFile,
  options: UploadProblem,
  watch: ReadingWatch = {},
): Promise<UploadedProblem> {
  const upload = await readProblemUpload(app, actor, file, options, watch)
  if (options.dryRun) return upload.view
  if (upload.incomplete && !options.skipRejected) throw upload.incomplete
  return saveProblem(app, actor, upload)
}

/**
 * Reads a file, or finds what was read of it before; a large one is kept for a while.
 * @throws DomainError when no problem can be made of the file
 */
export async function readProblemUpload(
  app: App,
  actor: Actor,
  file: UploadedFile,
  options: UploadProblem,
  watch: ReadingWatch = {},
): Promise<ReadUpload> {
  const { format, form, convention, sense } = options
  const name = options.name ?? nameOf(file.name)
  const key = JSON.stringify({ format, form, convention, sense })
  const known = app.uploads.reading(file, key)
  if (known) return { ...known, view: { ...known.view, name } }
  const { reading, structure } = await app.compute.run(
    'readProblemFile',
    { bytes: file.bytes, format, form, convention, sense },
    { signal: watch.signal, onProgress: ({ bytes }) => watch.onProgress?.(bytes) },
  )
  if (!reading.problem || !structure) throw unreadable(file.name, reading)
  const upload: ReadUpload = {
    view: { ...viewOf(reading, reading.problem, structure), name },
    data: { form: reading.form, labels: reading.labels, problem: reading.problem },
    source: {
      fileName: file.name,
      bytes: file.bytes.byteLength,
      sha256: createHash('sha256').update(file.bytes).digest('hex'),
    },
    rejectedList: reading.rejectedList,
    incomplete: reading.rejectedCount > 0 ? rejectedLines(file.name, reading) : null,
  }
  // The name is put in before it is kept, and shared: whoever finds the reading again is told it too.
  if (options.dryRun) upload.view.kept = app.uploads.keep(actor, file, key, upload)
  return upload
}

function viewOf(reading: FileReading, problem: Problem, structure: StructureReport): Omit<UploadedProblem, 'name'> {
  return {
    id: null,
    number: null,
    kept: null,
    form: reading.form,
    variables: problem.n,
    interactions: problem.values.length,
    offset: signed(signOf(reading.sense), problem.offset),
    sense: reading.sense,
    warnings: warningsOf(reading),
    reading: readingView(reading),
    structure: {
      ...structure,
      degreeHistogram: [...structure.degreeHistogram],
      linearHistogram: [...structure.linearHistogram],
      interactionHistogram: [...structure.interactionHistogram],
    },
  }
}

async function saveProblem(app: App, actor: Actor, upload: ReadUpload): Promise<UploadedProblem> {
  const { view, data, source } = upload
  const { bytes, fingerprint } = packProblem(data)
  const dataBlobId = await app.blobs.write(bytes)
  const reading = await keepRejected(app, upload)
  const id = randomUUID()
  const now = app.now()
  const number = await app.db.transaction(async (tx) => {
    const number = await nextNumber(tx, actor.workspaceId, 'problem')
    await app.blobs.adopt(tx, dataBlobId)
    if (reading.rejectedBlobId) await app.blobs.adopt(tx, reading.rejectedBlobId)
    await insertProblem(
      tx,
      {
        id,
        workspaceId: actor.workspaceId,
        number,
        name: view.name,
        createdBy: actor.userId,
        createdAt: now,
        changedAt: now,
      },
      {
        form: view.form,
        sense: view.sense,
        variables: view.variables,
        interactions: view.interactions,
        dataBlobId,
        fingerprint,
        source,
        reading,
        structure: view.structure,
        versionBy: actor.userId,
        versionAt: now,
      },
    )
    return number
  })
  return { ...view, kept: null, id, number }
}

const nameOf = (fileName: string): string => nameFrom(fileName.replace(/\.[^.]*$/, '')) || 'Unnamed problem'
