/**
 * Labels and their indices in order of first appearance, found by the bytes that stand in a file. Small whole numbers are
 * looked up in an array, other labels by a hash of their bytes (FNV-1a; open addressing). Where too many fall on one place, as a
 * file made for it could bring about, a map of strings takes over.
 */
import { bytesOf, textOf } from './text'

const DEFAULTS = { numbers: 1024, slots: 4096, arenaBytes: 65_536, mostProbes: 64 }

/** Whole numbers below this are looked up in an array. */
export const MOST_NUMBER = 2 ** 22
/** Digits of the largest of them. */
export const NUMBER_DIGITS = 7

/** Of a hash to which nothing was added yet. */
export const HASH_BASIS = 0x811c9dc5 | 0
const HASH_PRIME = 0x01000193
const CANONICAL = /^(?:0|[1-9]\d{0,6})$/
const NONE = -1

/** The hash of one byte more. */
export const addToHash = (hash: number, code: number): number => Math.imul(hash ^ code, HASH_PRIME)

function hashOf(bytes: Uint8Array, start: number, end: number): number {
  let hash = HASH_BASIS
  for (let p = start; p < end; p++) hash = addToHash(hash, bytes[p]!)
  return hash
}

/** The bits that choose the place hold something of all bits. */
const mixed = (hash: number): number => hash ^ (hash >>> 15)

export class LabelTable {
  readonly labels: string[] = []
  /** The line in which each label stood first. */
  readonly lines: number[] = []
  /** Index + 1 of the label that is this number, or 0. */
  private numbers = new Uint32Array(DEFAULTS.numbers)
  /** Index + 1 of a label with other bytes, or 0. */
  private slots = new Uint32Array(DEFAULTS.slots)
  private used = 0
  private readonly hashes: number[] = []
  /** Bytes of the labels in `slots`: arena[begins[i], ends[i]). */
  private arena = new Uint8Array(DEFAULTS.arenaBytes)
  private readonly begins: number[] = []
  private readonly ends: number[] = []
  private filled = 0
  private readonly crowded = new Map<string, number>()

  /** Whether no label can be another one written differently: all are small numbers in their usual writing. */
  get isNumbered(): boolean {
    return this.used === 0 && this.crowded.size === 0
  }

  /** The place of each label in ascending numerical order, where all are small numbers. */
  numberRanks(): Uint32Array {
    const ranks = new Uint32Array(this.labels.length)
    let rank = 0
    for (const entry of this.numbers) if (entry > 0) ranks[entry - 1] = rank++
    return ranks
  }

  /** The index of the label that is the whole number 0 … MOST_NUMBER − 1; added when it is new. */
  number(value: number, line: number): number {
    const known = value < this.numbers.length ? this.numbers[value]! : 0
    return known > 0 ? known - 1 : this.addNumber(value, line)
  }

  /** The index of the label bytes[start, end), which is no such number and has this hash; added when it is new. */
  name(bytes: Uint8Array, start: number, end: number, hash: number, line: number): number {
    const known = this.find(bytes, start, end, hash)
    return known === NONE ? this.addName(bytes, start, end, hash, line) : known
  }

  indexOf(label: string): number | undefined {
    if (CANONICAL.test(label) && Number(label) < MOST_NUMBER) {
      const known = this.numbers[Number(label)]
      return known ? known - 1 : undefined
    }
    const bytes = bytesOf(label)
    const known = this.find(bytes, 0, bytes.length, hashOf(bytes, 0, bytes.length))
    return known === NONE ? undefined : known
  }

  add(label: string, line: number): number {
    if (CANONICAL.test(label) && Number(label) < MOST_NUMBER) return this.number(Number(label), line)
    const bytes = bytesOf(label)
    return this.name(bytes, 0, bytes.length, hashOf(bytes, 0, bytes.length), line)
  }

  private push(label: string, line: number): number {
    this.lines.push(line)
    return this.labels.push(label) - 1
  }

  private addNumber(value: number, line: number): number {
    if (value >= this.numbers.length) {
      const larger = new Uint32Array(Math.min(MOST_NUMBER, 2 * Math.max(value, this.numbers.length)) + 1)
      larger.set(this.numbers)
      this.numbers = larger
    }
    const index = this.push(String(value), line)
    this.numbers[value] = index + 1
    return index
  }

  private find(bytes: Uint8Array, start: number, end: number, hash: number): number {
    const mask = this.slots.length - 1
    for (let probe = 0, slot = mixed(hash) & mask; probe < DEFAULTS.mostProbes; probe++, slot = (slot + 1) & mask) {
      const index = this.slots[slot]! - 1
      if (index < 0) break
      if (this.hashes[index] === hash && this.isAt(index, bytes, start, end)) return index
    }
    return this.crowded.size === 0 ? NONE : (this.crowded.get(textOf(bytes.subarray(start, end))) ?? NONE)
  }

  private isAt(index: number, bytes: Uint8Array, start: number, end: number): boolean {
    const begin = this.begins[index]!
    if (this.ends[index]! - begin !== end - start) return false
    for (let k = 0; k < end - start; k++) if (this.arena[begin + k] !== bytes[start + k]) return false
    return true
  }

  private addName(bytes: Uint8Array, start: number, end: number, hash: number, line: number): number {
    const label = textOf(bytes.subarray(start, end))
    if (2 * this.used > this.slots.length) this.widen()
    const index = this.push(label, line)
    const slot = this.freeSlot(hash)
    if (slot === NONE) {
      this.crowded.set(label, index)
      return index
    }
    this.keepBytes(index, bytes, start, end)
    this.hashes[index] = hash
    this.slots[slot] = index + 1
    this.used++
    return index
  }

  private freeSlot(hash: number): number {
    const mask = this.slots.length - 1
    for (let probe = 0, slot = mixed(hash) & mask; probe < DEFAULTS.mostProbes; probe++, slot = (slot + 1) & mask)
      if (this.slots[slot] === 0) return slot
    return NONE
  }

  private keepBytes(index: number, bytes: Uint8Array, start: number, end: number): void {
    const length = end - start
    if (this.filled + length > this.arena.length) {
      const larger = new Uint8Array(2 * this.arena.length + length)
      larger.set(this.arena)
      this.arena = larger
    }
    for (let k = 0; k < length; k++) this.arena[this.filled + k] = bytes[start + k]!
    this.begins[index] = this.filled
    this.filled += length
    this.ends[index] = this.filled
  }

  /** Twice as many slots; labels that find none there go to the map. */
  private widen(): void {
    const held = this.slots
    this.slots = new Uint32Array(2 * held.length)
    this.used = 0
    for (const entry of held) {
      if (entry === 0) continue
      const slot = this.freeSlot(this.hashes[entry - 1]!)
      if (slot === NONE) this.crowded.set(this.labels[entry - 1]!, entry - 1)
      else {
        this.slots[slot] = entry
        this.used++
      }
    }
  }
}
