import busboy from '@fastify/busboy'
import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { DomainError } from '../../shared/errors'

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

/**
 * Reads a multipart form with at most one file, streaming, and gives up as soon as it grows past the limit.
 * @param limitBytes of the file
 * @param fieldBytes of each other part
 */
export async function readUpload(event: H3Event, limitBytes: number, fieldBytes = MAX_FIELD_BYTES): Promise<Upload> {
  const type = getHeader(event, 'content-type') ?? ''
  if (!type.startsWith('multipart/form-data'))
    throw new DomainError('unreadable', 'upload.type', 'Send the file as multipart/form-data with a part named “file”.')
  // Parts around the file are small; a declared length beyond the limit is refused before anything is read.
  if (Number(getHeader(event, 'content-length') ?? 0) > limitBytes + fieldBytes + 2 ** 20) throw tooLarge(limitBytes)
  const request = event.node.req
  const parser = parserOf(event, type, limitBytes, fieldBytes)
  const upload: Upload = { fields: {}, file: null }
  return new Promise<Upload>((resolve, reject) => {
    const fail = (error: DomainError): void => {
      request.unpipe(parser)
      request.resume()
      reject(error)
    }
    parser.on('field', (name, value, _, isCut) => {
      if (isCut) fail(fieldTooLong(name, fieldBytes))
      else upload.fields[name] = value
    })
    parser.on('file', (part, stream, fileName) => {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('limit', () => fail(tooLarge(limitBytes)))
      stream.on('end', () => {
        if (part === 'file') upload.file = { name: keptName(fileName), bytes: Buffer.concat(chunks) }
      })
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
    parser.on('finish', () => resolve(upload))
    request.pipe(parser)
  })
}

/** The file of an upload. @throws DomainError when the form has none */
export function requireFile({ file }: Upload): { name: string; bytes: Uint8Array } {
  if (file) return file
  throw new DomainError('unreadable', 'upload.file', 'The form has no file. Send it as the part named “file”.')
}
