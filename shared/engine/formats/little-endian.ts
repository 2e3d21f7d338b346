/** The unsigned number in the four bytes from `at`, lowest first. */
export const uint32 = (bytes: Uint8Array, at: number): number =>
  new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(at, true)

/** The unsigned number in the two bytes from `at`, lowest first. */
export const uint16 = (bytes: Uint8Array, at: number): number =>
  new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint16(at, true)
