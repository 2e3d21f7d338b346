import type { Readable } from 'node:stream'
import busboy from '@fastify/busboy'
import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { DomainError } from '../../shared/errors'
import type { StoredFile } from '../services/stored-files'
import { inTemporaryFolder, storeFile } from '../services/stored-files'
import { formRead } from './once'

export interface Upload {
  fields: Record<string, string>
  file: { name: string; bytes: Uint8Array } | null
}

const MAX_FIELDS = 40
const MAX_FIELD_BYTES = 10_000
const MAX_FILE_NAME = 200
const mebibytes = (bytes: number): string => `${Math.round(bytes / 2 ** 20)} MiB`

const tooLarge = (limit: number): DomainError =>
  new DomainError('too large', 'upload.size', `The file is larger than the ${mebibytes(limit)} that are taken here.`)

const fieldTooLong = (name: string, limit: number): DomainError =>
  new DomainError(
    'too large',
    'upload.field',
    `The part ${name.slice(0, 40)} is longer than the ${limit} bytes that are taken here.`,
  )

const malformed = (): DomainError =>
  new DomainError('unreadable', 'upload.form', 'The upload is not a valid multipart form.')

/** A file's name as it is kept: without control characters, and of modest length. */
const keptName = (fileName: string | undefined): string =>
  (fileName ?? '')
    .replace(/[\p{Cc}\p{Cs}]/gu, '')
    .slice(0, MAX_FILE_NAME)
    .toWellFormed() || 'file'

function parserOf(event: H3Event, type: string, limitBytes: number, fieldBytes: number) {
  try {
    return busboy({
      headers: { ...event.node.req.headers, 'content-type': type },
      limits: { fileSize: limitBytes, files: 1, fields: MAX_FIELDS, fieldSize: fieldBytes },
    })
  } catch {
    throw malformed()
  }
}

/** Reads a multipart form with at most one file, which is handed on as it comes. */
async function receive(
  event: H3Event,
  limitBytes: number,
  fieldBytes: number,
  onFile: (stream: Readable, name: string) => void,
): Promise<{ fields: Record<string, string> }> {
  const type = getHeader(event, 'content-type') ?? ''
  if (!type.startsWith('multipart/form-data'))
    throw new DomainError('unreadable', 'upload.type', 'Send the file as multipart/form-data with a part named “file”.')
  // Parts around the file are small; a declared length beyond the limit is refused before anything is read.
  if (Number(getHeader(event, 'content-length') ?? 0) > limitBytes + fieldBytes + 2 ** 20) throw tooLarge(limitBytes)
  const request = event.node.req
  const parser = parserOf(event, type, limitBytes, fieldBytes)
  const fields: Record<string, string> = {}
  return new Promise((resolve, reject) => {
    let open: Readable | null = null
    const fail = (error: DomainError): void => {
      request.unpipe(parser)
      request.resume()
      open?.destroy()
      reject(error)
    }
    // A sender that goes away ends the request without an end of the form.
    request.on('close', () => request.complete || fail(malformed()))
    parser.on('field', (name, value, _, isCut) => {
      if (isCut) fail(fieldTooLong(name, fieldBytes))
      else fields[name] = value
    })
    parser.on('file', (part, stream, fileName) => {
      stream.on('limit', () => fail(tooLarge(limitBytes)))
      open = stream
      if (part === 'file') onFile(stream, keptName(fileName))
      else stream.resume()
    })
    parser.on('filesLimit', () =>
      fail(
        new DomainError(
          'unreadable',
          'upload.files',
          'The form has several files. Send one, as the part named “file”.',
        ),
      ),
    )
    parser.on('error', () => fail(malformed()))
    parser.on('finish', () => resolve({ fields }))
    request.pipe(parser)
  })
}

/**
 * Reads a multipart form with at most one file, streaming, and gives up as soon as it grows past the limit.
 * @param limitBytes of the file
 * @param fieldBytes of each other part
 */
export async function readUpload(event: H3Event, limitBytes: number, fieldBytes = MAX_FIELD_BYTES): Promise<Upload> {
  let file: Upload['file'] = null
  const { fields } = await receive(event, limitBytes, fieldBytes, (stream, name) => {
    const chunks: Buffer[] = []
    stream.on('data', (chunk: Buffer) => chunks.push(chunk))
    stream.on('end', () => (file = { name, bytes: Buffer.concat(chunks) }))
  })
  formRead(event, fields, ...partsOf(file))
  return { fields, file }
}

/** Written so because the compiler does not see that a callback sets the file. */
const partsOf = (file: Upload['file']): (string | Uint8Array)[] => (file ? [file.name, file.bytes] : [])

/** The file of an upload. @throws DomainError when the form has none */
export function requireFile<T>({ file }: { file: T | null }): T {
  if (file) return file
  throw new DomainError('unreadable', 'upload.file', 'The form has no file. Send it as the part named “file”.')
}

/**
 * Reads a multipart form whose file goes to the disk as it comes, so that its size costs no memory; the file is gone once
 * the work is over.
 * @param limitBytes of the file
 * @param fieldBytes of each other part
 */
export async function withStoredUpload<T>(
  event: H3Event,
  { limitBytes, fieldBytes }: { limitBytes: number; fieldBytes: number },
  work: (fields: Record<string, string>, file: StoredFile | null) => Promise<T>,
): Promise<T> {
  return inTemporaryFolder(async (folder) => {
    let stored: Promise<StoredFile> | null = null
    const { fields } = await receive(event, limitBytes, fieldBytes, (stream, name) => {
      stored = storeFile(stream, name, folder)
      // What goes wrong with the form is told first; a file cut short by it is no second fault.
      stored.catch(() => {})
    })
    const file = await (stored as Promise<StoredFile> | null)
    formRead(event, fields, ...(file ? [file.name, file.sha256] : []))
    return work(fields, file)
  })
}
