import { expect, it } from 'vitest'
import { decodeCopyColumn, encodeCopyRows } from '../../../../server/database/repositories/copy-format'

it('writes the layout of the PostgreSQL documentation (COPY, Binary Format)', () => {
  const bytes = encodeCopyRows([['id', 7, Uint8Array.of(1, 2, 3)]])
  const expected = [
    ...[0x50, 0x47, 0x43, 0x4f, 0x50, 0x59, 0x0a, 0xff, 0x0d, 0x0a, 0x00, 0, 0, 0, 0, 0, 0, 0, 0],
    ...[0, 3, 0, 0, 0, 2, 0x69, 0x64, 0, 0, 0, 4, 0, 0, 0, 7, 0, 0, 0, 3, 1, 2, 3],
    ...[0xff, 0xff],
  ]
  expect(Array.from(bytes)).toEqual(expected)
})

it('reads a column back', () => {
  const rows = [Uint8Array.of(9, 8), new Uint8Array(), Uint8Array.of(0)]
  expect(decodeCopyColumn(encodeCopyRows(rows.map((row) => [row])))).toEqual(rows)
})
