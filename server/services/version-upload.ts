import type { UploadedVersion, UploadVersion } from '../../shared/schemas/problem-versions'
import type { Actor, App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import { packProblem } from './problem-data'
import { differenceBetween } from './problem-difference'
import type { ReadingWatch, ReadUpload, UploadedFile } from './problem-upload'
import { readProblemUpload } from './problem-upload'
import { addVersion } from './problem-versions'
import { problemData, problemRow } from './problems'
import { keepRejected } from './rejected-lines'

/** A file that does not say its form is read in the form of the version before. */
async function readForVersion(
  app: App,
  actor: Actor,
  row: ProblemRow,
  file: UploadedFile,
  options: UploadVersion,
  watch: ReadingWatch,
) {
  const upload = await readProblemUpload(app, actor, file, options, watch)
  if (upload.view.reading.formSource !== 'default' || upload.view.form === row.form) return upload
  const again = await readProblemUpload(app, actor, file, { ...options, form: row.form }, watch)
  // Nobody chose it: it follows from the version before.
  const reading = { ...again.view.reading, formSource: 'default' as const }
  return { ...again, view: { ...again.view, reading } }
}

const isSame = (row: ProblemRow, { view, data }: ReadUpload): boolean =>
  view.sense === row.sense && packProblem(data).fingerprint === row.fingerprint

/** Reads a file, and saves it as the next version of a problem unless only the preview was asked for. */
export async function uploadVersion(
  app: App,
  actor: Actor,
  id: string,
  file: UploadedFile,
  options: UploadVersion,
  watch: ReadingWatch = {},
): Promise<UploadedVersion> {
  const row = await problemRow(app, actor, id)
  const upload = await readForVersion(app, actor, row, file, options, watch)
  const { data, source, incomplete } = upload
  const view = { ...upload.view, name: row.name }
  if (options.dryRun) {
    const before = { ...(await problemData(app, row)), sense: row.sense }
    const difference = await differenceBetween(app, before, { ...data, sense: view.sense })
    return { ...view, version: null, before: row.version, difference, isSame: isSame(row, upload) }
  }
  if (incomplete && !options.skipRejected) throw incomplete
  const { form, sense, variables, interactions, structure } = view
  const reading = await keepRejected(app, upload)
  const draft = { remark: options.remark, form, sense, variables, interactions, source, reading, structure }
  const { version, difference } = await addVersion(app, actor, id, data, draft)
  return { ...view, kept: null, id, number: row.number, version, before: version - 1, difference, isSame: false }
}
