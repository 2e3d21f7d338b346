/** Remainders of the 256 bytes by the polynomial of CRC-32 (ISO 3309; RFC 1952, section 8), bits reversed. */
const REMAINDERS = Uint32Array.from({ length: 256 }, (_, byte) => {
  let rest = byte
  for (let bit = 0; bit < 8; bit++) rest = rest & 1 ? 0xedb88320 ^ (rest >>> 1) : rest >>> 1
  return rest
})

/** CRC-32 of the bytes, or of earlier bytes and these when the checksum of the earlier ones is given; 0 … 2³² − 1. */
export function crc32(bytes: Uint8Array, earlier = 0): number {
  let rest = ~earlier
  for (let p = 0; p < bytes.length; p++) rest = REMAINDERS[(rest ^ bytes[p]!) & 0xff]! ^ (rest >>> 8)
  return ~rest >>> 0
}
