import { createHash, randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { ProblemSource } from '../../shared/schemas/problem-versions'
import type { ReadingView, UploadedProblem, UploadProblem } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertProblem } from '../database/repositories/problems'
import type { ReadProblemOutput } from '../workers/tasks/read-problem'
import type { ProblemData } from './problem-data'
import { packProblem } from './problem-data'
import { signed, signOf } from './sense'

/** Of a file as it is sent. */
export const PROBLEM_LIMIT_BYTES = 64 * 2 ** 20

export interface UploadedFile {
  name: string
  bytes: Uint8Array
}

type Reading = NonNullable<ReadProblemOutput['reading']>

/** A file as it was read; nothing is saved yet. */
export interface ReadUpload {
  view: UploadedProblem
  data: ProblemData
  source: ProblemSource
  /** Why it cannot be saved unless the lines that could not be read are left out. */
  incomplete: DomainError | null
}

/** Reads a file, and saves it as a problem unless only the preview was asked for. */
export async function uploadProblem(
  app: App,
  actor: Actor,
  file: UploadedFile,
  options: UploadProblem,
): Promise<UploadedProblem> {
  const upload = await readProblemUpload(app, file, options)
  if (options.dryRun) return upload.view
  if (upload.incomplete && !options.skipRejected) throw upload.incomplete
  return saveProblem(app, actor, upload)
}

/** @throws DomainError when no problem can be made of the file */
export async function readProblemUpload(app: App, file: UploadedFile, options: UploadProblem): Promise<ReadUpload> {
  const { format, form, convention, sense } = options
  const output = await app.compute.run('readProblemFile', { bytes: file.bytes, format, form, convention, sense })
  const { reading, structure } = output
  if (!reading)
    throw new DomainError(
      'unreadable',
      'problem.not-text',
      `${file.name} is not UTF-8 text. Send a coefficient list or a dense matrix as CSV.`,
    )
  if (!reading.problem || !structure) throw unreadable(file.name, reading)
  const view: UploadedProblem = {
    id: null,
    number: null,
    name: options.name ?? nameFrom(file.name),
    form: reading.form,
    variables: reading.problem.n,
    interactions: reading.problem.values.length,
    offset: signed(signOf(reading.sense), reading.problem.offset),
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
  const sha256 = createHash('sha256').update(file.bytes).digest('hex')
  return {
    view,
    data: { form: reading.form, labels: reading.labels, problem: reading.problem },
    source: { fileName: file.name, bytes: file.bytes.byteLength, sha256 },
    incomplete: reading.rejectedCount > 0 ? rejectedLines(file.name, reading) : null,
  }
}

async function saveProblem(app: App, actor: Actor, { view, data, source }: ReadUpload): Promise<UploadedProblem> {
  const { bytes, fingerprint } = packProblem(data)
  const dataBlobId = await app.blobs.write(bytes)
  const id = randomUUID()
  const now = app.now()
  const number = await app.db.transaction(async (tx) => {
    const number = await nextNumber(tx, actor.workspaceId, 'problem')
    await app.blobs.adopt(tx, dataBlobId)
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
        reading: view.reading,
        structure: view.structure,
        versionBy: actor.userId,
        versionAt: now,
      },
    )
    return number
  })
  return { ...view, id, number }
}

const nameFrom = (fileName: string): string => fileName.replace(/\.[^.]*$/, '').slice(0, 120) || 'Unnamed problem'

function readingView(reading: Reading): ReadingView {
  const { format, form, formSource, convention, sense, triangle } = reading
  const { entriesRead, duplicatesSummed, zerosDropped, firstRows, rejected, rejectedCount } = reading
  return {
    format: format as ReadingView['format'],
    formatTitle: format === 'dense-csv' ? 'dense matrix' : 'coefficient list',
    form,
    formSource,
    convention,
    sense,
    triangle,
    entriesRead,
    duplicatesSummed,
    zerosDropped,
    firstRows,
    rejected: [...rejected],
    rejectedCount,
  }
}

const plural = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

function warningsOf(reading: Reading): string[] {
  const warnings: string[] = []
  if (reading.rejectedCount > 0) warnings.push(`${plural(reading.rejectedCount, 'line')} could not be read.`)
  if (reading.duplicatesSummed > 0)
    warnings.push(`${plural(reading.duplicatesSummed, 'duplicate entry', 'duplicate entries')} summed.`)
  if (reading.zerosDropped > 0)
    warnings.push(
      `${plural(reading.zerosDropped, 'pair')} came to zero and ${reading.zerosDropped === 1 ? 'was' : 'were'} dropped.`,
    )
  if (reading.triangle === 'both')
    warnings.push('Entries stand in both triangles without mirroring each other; each pair was summed.')
  if (reading.header) warnings.push(`Line ${reading.header.line} was taken for column names.`)
  if (reading.sense === 'max') warnings.push('To be maximised: values are negated inside and shown in their own sense.')
  return warnings
}

const SHOWN_LINES = 100

function rejectedLines(fileName: string, reading: Reading): DomainError {
  const first = reading.rejected[0]!
  return new DomainError(
    'not acceptable',
    'problem.rejected-lines',
    `${fileName}: ${plural(reading.rejectedCount, 'line')} could not be read, the first at line ${first.line}: ${first.reason}. Correct the file, or save without ${reading.rejectedCount === 1 ? 'this line' : 'these lines'}.`,
    reading.rejected.slice(0, SHOWN_LINES).map(({ line, reason }) => ({ line, message: reason })),
  )
}

function unreadable(fileName: string, reading: Reading): DomainError {
  const issues = [
    ...reading.issues,
    ...reading.rejected.slice(0, SHOWN_LINES).map(({ line, reason }) => ({ line, message: reason })),
  ]
  return new DomainError(
    'not acceptable',
    'problem.unreadable',
    `${fileName}: ${reading.issues[0]?.message ?? 'nothing could be read'}`,
    issues,
  )
}
