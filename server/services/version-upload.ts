import type { UploadedVersion, UploadVersion } from '../../shared/schemas/problem-versions'
import type { Actor, App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import { packProblem } from './problem-data'
import { differenceBetween } from './problem-difference'
import type { ReadUpload, UploadedFile } from './problem-upload'
import { readProblemUpload } from './problem-upload'
import { addVersion } from './problem-versions'
import { problemData, problemRow } from './problems'

/** A file that does not say its form is read in the form of the version before. */
async function readForVersion(app: App, row: ProblemRow, file: UploadedFile, options: UploadVersion) {
  const upload = await readProblemUpload(app, file, options)
  if (upload.view.reading.formSource !== 'default' || upload.view.form === row.form) return upload
  return readProblemUpload(app, file, { ...options, form: row.form })
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
): Promise<UploadedVersion> {
  const row = await problemRow(app, actor, id)
  const upload = await readForVersion(app, row, file, options)
  const { data, source, incomplete } = upload
  const view = { ...upload.view, name: row.name }
  if (options.dryRun) {
    const before = { ...(await problemData(app, row)), sense: row.sense }
    const difference = await differenceBetween(app, before, { ...data, sense: view.sense })
    return { ...view, version: null, before: row.version, difference, isSame: isSame(row, upload) }
  }
  if (incomplete && !options.skipRejected) throw incomplete
  const { form, sense, variables, interactions, reading, structure } = view
  const draft = { remark: options.remark, form, sense, variables, interactions, source, reading, structure }
  const { version, difference } = await addVersion(app, actor, id, data, draft)
  return { ...view, id, number: row.number, version, before: version - 1, difference, isSame: false }
}
