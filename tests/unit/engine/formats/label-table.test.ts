import { expect, it } from 'vitest'
import { addToHash, HASH_BASIS, LabelTable, MOST_NUMBER } from '../../../../shared/engine/formats/label-table'
import { createRandom } from '../../../../shared/engine/random'

const encode = (text: string): Uint8Array => new TextEncoder().encode(text)

/** Asks for a label as the readers do: small numbers as such, others by their bytes. */
function ask(table: LabelTable, label: string, line: number): number {
  if (/^(?:0|[1-9]\d*)$/.test(label) && Number(label) < MOST_NUMBER) return table.number(Number(label), line)
  const bytes = encode(`,${label},`)
  const hash = bytes.subarray(1, -1).reduce(addToHash, HASH_BASIS)
  return table.name(bytes, 1, bytes.length - 1, hash, line)
}

it('gives indices in order of first appearance, as a map of strings does', () => {
  const random = createRandom(91)
  const table = new LabelTable()
  const oracle = new Map<string, number>()
  const lines: number[] = []
  const wrong: string[] = []
  for (let line = 1; line <= 60_000; line++) {
    const number = random.below(12_000)
    const label = [`${number}`, `x${number}`, `00${number}`, `${MOST_NUMBER + number}`, `Käi ${number}`][
      random.below(5)
    ]!
    const expected = oracle.get(label) ?? oracle.size
    if (!oracle.has(label)) lines.push(line)
    oracle.set(label, expected)
    const found = random.below(2) ? ask(table, label, line) : (table.indexOf(label) ?? table.add(label, line))
    if (found !== expected) wrong.push(label)
  }
  expect(wrong).toEqual([])
  expect(table.labels).toEqual([...oracle.keys()])
  expect(table.lines).toEqual(lines)
  expect(table.isNumbered).toBe(false)
})

it('ranks numbers', () => {
  const table = new LabelTable()
  for (const value of [70_000, 3, 0, 12]) table.number(value, 1)
  expect(table.isNumbered).toBe(true)
  expect([...table.numberRanks()]).toEqual([3, 1, 0, 2])
})

/** The most texts that fall on one place of a table of the first size. */
function meetings(): string[] {
  const hashOf = (text: string): number =>
    [...encode(text)].reduce((hash, code) => Math.imul(hash ^ code, 0x01000193), 0x811c9dc5 | 0)
  const byPlace = new Map<number, string[]>()
  for (let k = 0; k < 300_000; k++) {
    const text = `m${k.toString(36)}`
    const hash = hashOf(text)
    const place = ((hash ^ (hash >>> 15)) >>> 0) & 4095
    const texts = byPlace.get(place) ?? []
    texts.push(text)
    byPlace.set(place, texts)
  }
  return [...byPlace.values()].reduce((most, texts) => (texts.length > most.length ? texts : most))
}

it('finds labels that crowd one place', () => {
  const labels = meetings()
  expect(labels.length).toBeGreaterThan(90)
  const table = new LabelTable()
  expect(labels.map((label, k) => ask(table, label, k))).toEqual([...labels.keys()])
  for (let k = 0; k < 5000; k++) ask(table, `other${k}`, 1)
  expect(labels.map((label) => table.indexOf(label))).toEqual([...labels.keys()])
})
