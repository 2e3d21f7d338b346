import type { ReadingView, UploadProblem } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import type { ReadUpload, UploadedFile } from './problem-upload'
import { problemRow } from './problems'

/** The reading as it is saved: more rejected lines than it shows go into a blob, to be adopted with it. */
export async function keepRejected(app: App, { view, rejectedList }: ReadUpload): Promise<ReadingView> {
  const { reading } = view
  if (reading.rejectedCount <= reading.rejected.length) return reading
  return { ...reading, rejectedBlobId: await app.blobs.write(new TextEncoder().encode(rejectedList)) }
}

const quoted = (text: string): string => `"${text.replaceAll('"', '""')}"`

function listOf({ rejected, rejectedCount }: ReadingView): string {
  const rows = rejected.map(({ line, reason, text }) => `${line},${quoted(reason)},${quoted(text)}`)
  const rest = rejectedCount - rejected.length
  const end = rest > 0 ? [`,${quoted(`${rest} more lines were rejected and are not listed`)},`] : []
  return `${['line,reason,text', ...rows, ...end].join('\r\n')}\r\n`
}

/** The lines that were left out of a problem, as CSV `line,reason,text`. */
export async function rejectedLinesOf(app: App, actor: Actor, id: string, version: number | undefined) {
  const row = await problemRow(app, actor, id, version)
  const { rejectedBlobId } = row.reading
  const bytes = rejectedBlobId ? await app.blobs.read(rejectedBlobId) : new TextEncoder().encode(listOf(row.reading))
  return { name: `P-${row.number}-rejected.csv`, bytes }
}

/** The lines of a file that cannot be read, whether a problem comes of the others or not. */
export async function rejectedLinesIn(
  app: App,
  file: UploadedFile,
  { format, form, convention, sense }: UploadProblem,
) {
  const input = { bytes: file.bytes, format, form, convention, sense }
  const { list } = await app.compute.run('listRejectedLines', input)
  return { name: `${file.name.replace(/\.[^.]*$/, '')}-rejected.csv`, text: list }
}
