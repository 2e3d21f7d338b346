import { DecimalScan } from './decimal-scan'

const TAB = 0x09
const LINE_FEED = 0x0a
const CARRIAGE_RETURN = 0x0d
const SPACE = 0x20
const ZERO = 0x30
const MOST_DIGITS = 9
const NONE = -1

function afterBlanks(bytes: Uint8Array, from: number): number {
  let p = from
  while (bytes[p] === SPACE || bytes[p] === TAB) p++
  return p
}

/**
 * Reads lines `i j` and `i j value` of whole numbers from 0 and one decimal number, separated by white space, straight
 * from the bytes. The line has to end with a line feed.
 */
export class EntryScan {
  row = 0
  col = 0
  /** Undefined where the line has only two fields. */
  value: number | undefined
  private readonly number = new DecimalScan()
  private whole = 0

  /** The position of the line feed, or −1 when the line is anything else than that. */
  scan(bytes: Uint8Array, from: number): number {
    let p = this.scanWhole(bytes, afterBlanks(bytes, from))
    if (p < 0) return NONE
    this.row = this.whole
    p = this.scanWhole(bytes, afterBlanks(bytes, p))
    if (p < 0) return NONE
    this.col = this.whole
    this.value = undefined
    const third = afterBlanks(bytes, p)
    const feed = this.feedAt(bytes, third)
    if (feed >= 0) return feed
    p = third > p ? this.number.scan(bytes, third) : NONE
    if (p < 0) return NONE
    this.value = this.number.value
    return this.feedAt(bytes, afterBlanks(bytes, p))
  }

  private feedAt(bytes: Uint8Array, from: number): number {
    const p = bytes[from] === CARRIAGE_RETURN ? from + 1 : from
    return bytes[p] === LINE_FEED ? p : NONE
  }

  /** Reads a whole number and answers the blank or line ending behind it, or −1. */
  private scanWhole(bytes: Uint8Array, from: number): number {
    let p = from
    let whole = 0
    for (let code = bytes[p]!; code >= ZERO && code <= ZERO + 9; code = bytes[++p]!) whole = whole * 10 + code - ZERO
    if (p === from || p - from > MOST_DIGITS || bytes[p]! > SPACE) return NONE
    this.whole = whole
    return p
  }
}
