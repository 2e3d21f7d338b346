import { describe, expect, it } from 'vitest'
import { readZip, writeZip } from '../../../../shared/engine/formats/archive'
import { ReadingFault, type ProblemDocument } from '../../../../shared/engine/formats/format'
import {
  readNpyArray,
  writeDoubles,
  writeIntegers,
  writeTexts,
  writeWord,
} from '../../../../shared/engine/formats/npy-array'
import { npz } from '../../../../shared/engine/formats/npz'
import { repeatedElements } from '../../../../shared/engine/formats/sparse-arrays'
import { createRandom } from '../../../../shared/engine/random'
import { randomProblem, real } from '../../../fixtures/problems/random-problem'

const labels = ['north berth', 'söuth', '渡し船 🚢', 'x', '7']
const document: ProblemDocument = {
  form: 'ising',
  labels,
  problem: randomProblem(createRandom(1), 5, 0.6, real),
  sense: 'max',
}

/** What `npz` writes, with entries changed, added, or taken away where they are null. */
function changed(changes: Record<string, Uint8Array | null>, from = document): Uint8Array {
  const entries = readZip(npz.write(from), () => true)
  for (const [name, bytes] of Object.entries(changes))
    if (bytes) entries.set(`${name}.npy`, bytes)
    else entries.delete(`${name}.npy`)
  return writeZip(entries)
}

function faultOf(bytes: Uint8Array): string {
  try {
    npz.read([bytes], {})
  } catch (error) {
    if (error instanceof ReadingFault) return error.message
    throw error
  }
  return 'none'
}

const plain: ProblemDocument = {
  form: 'qubo',
  labels: ['0', '1', '2'],
  problem: randomProblem(createRandom(2), 3, 1, real),
  sense: 'min',
}

/** A matrix compressed by rows: elements 1, 2, 3 at (0, 1), (0, 2) and (1, 2). */
const csr = {
  format: writeWord('csr'),
  data: writeDoubles(Float64Array.of(1, 2, 3)),
  indices: writeIntegers([1, 2, 2]),
  indptr: writeIntegers([0, 2, 3, 3]),
}

describe('a sparse matrix of SciPy', () => {
  it('carries form, sense, offset and labels', () => {
    const reading = npz.read([npz.write(document)], {})
    expect(reading).toMatchObject({ form: 'ising', formSource: 'file', sense: 'max', labels, issues: [] })
    expect(reading.problem).toEqual(document.problem)
    expect(npz.write(document)).toEqual(npz.write(document))
  })

  it('has the labels 0 … n − 1 where it names none', () => {
    expect(readZip(npz.write(plain), () => true).has('labels.npy')).toBe(false)
    expect(npz.read([npz.write(plain)], {})).toMatchObject({ labels: plain.labels, problem: plain.problem })
  })

  it('is read by row and by column', () => {
    const rows = npz.read([changed(csr, plain)], {})
    expect(rows.problem).toMatchObject({ rows: Uint32Array.of(0, 0, 1), cols: Uint32Array.of(1, 2, 2) })
    expect(rows.problem!.values).toEqual(Float64Array.of(1, 2, 3))
    const cols = npz.read([changed({ ...csr, format: writeWord('csc') }, plain)], {})
    expect(cols.problem).toEqual(rows.problem)
    expect([rows.triangle, cols.triangle]).toEqual(['upper', 'lower'])
  })

  it.each<[string, Record<string, Uint8Array | null>]>([
    ['no entry "format"', { format: null }],
    ['no entry "row"', { row: null }],
    ['of the kind "lil"', { format: writeWord('lil') }],
    ['format in the archive holds no text', { format: writeIntegers([1]) }],
    ['has the shape (3, 4); a square one', { shape: writeIntegers([3, 4]) }],
    ['has the shape (3); a square one', { shape: writeIntegers([3]) }],
    ['the matrix is empty', { shape: writeIntegers([0, 0]) }],
    ['at most 1000000 variables', { shape: writeIntegers([2_000_000, 2_000_000]) }],
    ['no entry "shape"', { shape: null }],
    ['col[1] is 3, outside 0 … 2', { col: writeIntegers([0, 3, 2, 1, 2, 2]) }],
    ['col[1] is -1, outside 0 … 2', { col: writeIntegers([0, -1, 2, 1, 2, 2]) }],
    ['6 elements in data, but 5 in col', { col: writeIntegers([0, 1, 2, 1, 2]) }],
    ['row in the archive holds no integers', { row: writeDoubles(new Float64Array(6)) }],
    ['data[2]: the value NaN is not a finite number', { data: writeDoubles(Float64Array.of(1, 2, NaN, 4, 5, 6)) }],
    ['data in the archive: ', { data: new Uint8Array(70) }],
    ['expected 4 from 0', { ...csr, indptr: writeIntegers([0, 2, 3]) }],
    ['expected 4 from 0', { ...csr, indptr: writeIntegers([1, 2, 2, 3]) }],
    ['indptr[2] is 1, below indptr[1], 2', { ...csr, indptr: writeIntegers([0, 2, 1, 3]) }],
    ['indptr[3] is 4, outside 0 … 3', { ...csr, indptr: writeIntegers([0, 2, 2, 4]) }],
    ['indices[2] is 3, outside 0 … 2', { ...csr, indices: writeIntegers([1, 2, 3]) }],
    ['form must be qubo or ising, not "maxcut"', { form: writeWord('maxcut') }],
    ['form is more than one word', { form: writeTexts(['qubo', 'ising']) }],
    ['offset in the archive is not one number', { offset: writeDoubles(Float64Array.of(1, 2)) }],
    ['offset[0]: the value Infinity', { offset: writeDoubles(Float64Array.of(Infinity)) }],
    ['the archive has 2 labels for 3 variables', { labels: writeTexts(['a', 'b']) }],
    ['labels[1]: a label is empty', { labels: writeTexts(['a', '', 'c']) }],
    ['"a" (variable 0) and "A" (variable 2) differ only in upper', { labels: writeTexts(['a', 'b', 'A']) }],
  ])('is refused: %s', (reason, changes) => {
    expect(faultOf(changed(changes, plain))).toContain(reason)
  })

  it('passes over entries it does not know', () => {
    const bytes = changed({ '../../etc/passwd': Uint8Array.of(1), scratch: Uint8Array.of(2) }, plain)
    expect(npz.read([bytes], {}).problem).toEqual(plain.problem)
  })

  it('refuses labels that would take too much room', () => {
    const many = ['v'.repeat(1_000_000), ...Array.from({ length: 99 }, (_, i) => String(i))]
    const problem = { ...plain.problem, n: many.length, linear: new Float64Array(many.length) }
    expect(() => npz.write({ ...plain, labels: many, problem })).toThrow('the labels are too long for a .npz file')
  })
})

describe('arrays of text', () => {
  it('come back, wide characters too', () => {
    const array = readNpyArray('labels', writeTexts(labels))
    expect(array.texts()).toEqual(labels)
    expect(array.type).toMatchObject({ kind: 'U', size: 4 * 11 })
  })
})

describe('repeated elements', () => {
  it('are those that stand where an earlier one stands', () => {
    const random = createRandom(5)
    for (let round = 0; round < 200; round++) {
      const n = 1 + random.below(5)
      const count = random.below(20)
      const rows = Uint32Array.from({ length: count }, () => random.below(n))
      const cols = Uint32Array.from({ length: count }, () => random.below(n))
      const places = new Set(Array.from(rows, (row, k) => `${row} ${cols[k]}`))
      expect(repeatedElements(n, { rows, cols })).toBe(count - places.size)
    }
  })
})
