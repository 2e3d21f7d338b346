import { Readable } from 'node:stream'
import type { H3Event } from 'h3'
import { expect, test } from 'vitest'
import { DomainError } from '../../../../shared/errors'
import { readUpload, requireFile } from '../../../../server/utils/upload'

const part = (name: string, text: string, fileName?: string): string =>
  `--b\r\nContent-Disposition: form-data; name="${name}"${fileName === undefined ? '' : `; filename="${fileName}"`}\r\n\r\n${text}\r\n`

function eventOf(body: string, type = 'multipart/form-data; boundary=b'): H3Event {
  const request = Object.assign(Readable.from([Buffer.from(body)]), { headers: { 'content-type': type } })
  return { node: { req: request }, headers: new Headers(request.headers) } as unknown as H3Event
}

const codeOf = (work: Promise<unknown>): Promise<string> =>
  work.then(
    () => 'nothing thrown',
    (error: unknown) => (error instanceof DomainError ? error.code : `not a domain error: ${String(error)}`),
  )

test('fields and the file are read', async () => {
  const upload = await readUpload(eventOf(`${part('name', 'N')}${part('file', 'a b 1', 'x.csv')}--b--\r\n`), 100)
  expect(upload.fields.name).toBe('N')
  expect(requireFile(upload)).toEqual({ name: 'x.csv', bytes: Buffer.from('a b 1') })
})

test('a form without its boundary is unreadable, not a failure of the server', async () => {
  expect(await codeOf(readUpload(eventOf('abc', 'multipart/form-data'), 100))).toBe('upload.form')
})

test('two files are refused by name of the fault, whichever comes first', async () => {
  for (const [first, second] of [
    ['file', 'other'],
    ['other', 'file'],
  ] as const) {
    const body = `${part(first, '1', '1.csv')}${part(second, '2', '2.csv')}--b--\r\n`
    expect(await codeOf(readUpload(eventOf(body), 100))).toBe('upload.files')
  }
})

test('a file beyond the limit is refused while it is read', async () => {
  const body = `${part('file', 'x'.repeat(200), 'x.csv')}--b--\r\n`
  expect(await codeOf(readUpload(eventOf(body), 100))).toBe('upload.size')
})

test('control characters do not reach the kept name of a file', async () => {
  const upload = await readUpload(eventOf(`${part('file', '1', 'a\u0001b.csv')}--b--\r\n`), 100)
  expect(requireFile(upload).name).toBe('ab.csv')
})
