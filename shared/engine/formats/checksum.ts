/** Remainders of the 256 bytes by the polynomial of CRC-32 (ISO 3309; RFC 1952, section 8), bits reversed. */
const REMAINDERS = Uint32Array.from({ length: 256 }, (_, byte) => {
  let rest = byte
  for (let bit = 0; bit < 8; bit++) rest = rest & 1 ? 0xedb88320 ^ (rest >>> 1) : rest >>> 1
  return rest
})

/** Bytes that are taken at once, and the remainders of each byte by how many of them follow it. */
const SLICE = 8
const SLICED = new Uint32Array(256 * SLICE)
SLICED.set(REMAINDERS)
for (let k = 256; k < SLICED.length; k++) SLICED[k] = REMAINDERS[SLICED[k - 256]! & 0xff]! ^ (SLICED[k - 256]! >>> 8)

/**
 * CRC-32 of the bytes, or of earlier bytes and these when the checksum of the earlier ones is given; 0 … 2³² − 1. Eight
 * bytes at once (Kounavis & Berry, A systematic approach to building high performance software-based CRC generators, 2005).
 */
export function crc32(bytes: Uint8Array, earlier = 0): number {
  let rest = ~earlier
  let p = 0
  for (; p + SLICE <= bytes.length; p += SLICE)
    rest =
      SLICED[1792 + ((rest ^ bytes[p]!) & 0xff)]! ^
      SLICED[1536 + (((rest >>> 8) ^ bytes[p + 1]!) & 0xff)]! ^
      SLICED[1280 + (((rest >>> 16) ^ bytes[p + 2]!) & 0xff)]! ^
      SLICED[1024 + ((rest >>> 24) ^ bytes[p + 3]!)]! ^
      SLICED[768 + bytes[p + 4]!]! ^
      SLICED[512 + bytes[p + 5]!]! ^
      SLICED[256 + bytes[p + 6]!]! ^
      SLICED[bytes[p + 7]!]!
  for (; p < bytes.length; p++) rest = REMAINDERS[(rest ^ bytes[p]!) & 0xff]! ^ (rest >>> 8)
  return ~rest >>> 0
}
