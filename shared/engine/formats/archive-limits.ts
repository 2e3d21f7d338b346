import { ReadingFault } from './format'

/** How large the contents of a container may be. */
export interface ArchiveLimits {
  /** Bytes that may come out. */
  readonly maxBytes: number
  /** Bytes out for each byte in, allowed beyond `freeBytes`: what grows faster was made to fill the memory. */
  readonly maxRatio: number
  /** Bytes that may come out whatever the ratio: the largest dense matrix, which may be nearly all zeros, has 200 MB. */
  readonly freeBytes: number
}

export const ARCHIVE_LIMITS: ArchiveLimits = { maxBytes: 512 * 2 ** 20, maxRatio: 200, freeBytes: 256 * 2 ** 20 }

const mebibytes = (bytes: number): string => `${Math.floor(bytes / 2 ** 20)} MiB`

/** @throws ReadingFault when `out` bytes made of `taken` are more than the limits allow */
export function checkGrowth(out: number, taken: number, { maxBytes, maxRatio, freeBytes }: ArchiveLimits): void {
  if (out > maxBytes)
    throw new ReadingFault(`unpacked, the file is larger than the ${mebibytes(maxBytes)} that are taken here`)
  if (out > freeBytes && out > taken * maxRatio)
    throw new ReadingFault(
      `unpacked, the file is more than ${maxRatio} times as large, and beyond ${mebibytes(freeBytes)}: such files are not taken`,
    )
}
