/** Plain loops over the lines of a file that do nothing with them but add up their lengths. */

const LINE_FEED = 0x0a

function byteLoop(bytes: Uint8Array): number {
  let sum = 0
  let start = 0
  for (let p = 0; p < bytes.length; p++)
    if (bytes[p] === LINE_FEED) {
      sum += p - start
      start = p + 1
    }
  return sum
}

function indexLoop(bytes: Uint8Array): number {
  let sum = 0
  let start = 0
  for (let end = bytes.indexOf(LINE_FEED); end >= 0; end = bytes.indexOf(LINE_FEED, start)) {
    sum += end - start
    start = end + 1
  }
  return sum
}

function decodedSlices(bytes: Uint8Array): number {
  const text = new TextDecoder().decode(bytes)
  let sum = 0
  let start = 0
  for (let end = text.indexOf('\n'); end >= 0; end = text.indexOf('\n', start)) {
    sum += text.slice(start, end).length
    start = end + 1
  }
  return sum
}

const decodedSplit = (bytes: Uint8Array): number =>
  new TextDecoder()
    .decode(bytes)
    .split('\n')
    .reduce((sum, line) => sum + line.length, 0)

/** A view of each line. */
function byteViews(bytes: Uint8Array): number {
  let sum = 0
  let start = 0
  for (let p = 0; p < bytes.length; p++)
    if (bytes[p] === LINE_FEED) {
      sum += bytes.subarray(start, p).length
      start = p + 1
    }
  return sum
}

/** Loops that find where lines end, and loops that make each line a thing of its own. */
export const LOOPS = {
  'byte loop': byteLoop,
  'indexOf on bytes': indexLoop,
  'byte views': byteViews,
  'decoded, slices': decodedSlices,
  'decoded, split': decodedSplit,
} as const

export const FINDING: readonly string[] = ['byte loop', 'indexOf on bytes']
