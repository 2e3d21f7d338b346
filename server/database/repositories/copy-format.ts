/**
 * PostgreSQL's binary COPY format (PostgreSQL documentation, SQL command COPY, "Binary Format"): signature, flags,
 * header extension, then per row a field count and length-prefixed fields, big-endian; −1 as field count ends it.
 */
const SIGNATURE = Uint8Array.of(0x50, 0x47, 0x43, 0x4f, 0x50, 0x59, 0x0a, 0xff, 0x0d, 0x0a, 0x00)
const HEADER_BYTES = SIGNATURE.length + 8

type Field = string | number | Uint8Array

/** Encodes rows of text, int4 and bytea fields. */
export function encodeCopyRows(rows: readonly (readonly Field[])[]): Uint8Array<ArrayBuffer> {
  const encoder = new TextEncoder()
  const encoded = rows.map((row) => row.map((field) => (typeof field === 'string' ? encoder.encode(field) : field)))
  const widthOf = (field: number | Uint8Array): number => (typeof field === 'number' ? 4 : field.byteLength)
  const total = encoded.reduce(
    (sum, row) => sum + 2 + row.reduce<number>((s, field) => s + 4 + widthOf(field), 0),
    HEADER_BYTES + 2,
  )
  const bytes = new Uint8Array(total)
  const view = new DataView(bytes.buffer)
  bytes.set(SIGNATURE)
  let at = HEADER_BYTES
  for (const row of encoded) {
    view.setInt16(at, row.length)
    at += 2
    for (const field of row) {
      view.setInt32(at, widthOf(field))
      if (typeof field === 'number') view.setInt32(at + 4, field)
      else bytes.set(field, at + 4)
      at += 4 + widthOf(field)
    }
  }
  view.setInt16(at, -1)
  return bytes
}

/** The values of the only column of a binary COPY. */
export function decodeCopyColumn(bytes: Uint8Array): Uint8Array[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const values: Uint8Array[] = []
  let at = HEADER_BYTES + view.getInt32(SIGNATURE.length + 4)
  while (view.getInt16(at) !== -1) {
    const length = view.getInt32(at + 2)
    values.push(bytes.slice(at + 6, at + 6 + length))
    at += 6 + length
  }
  return values
}
