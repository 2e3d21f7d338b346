import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { readProblem } from '../../shared/engine/formats/index'

/*
 * Files written by NumPy 2.4 and SciPy 1.17 and what they hold according to these (tests/fixtures/numpy/make.py): all
 * element types in both orders of bytes and of elements, sparse matrices of all kinds, Matrix Market files, gzip.
 */
interface Expected {
  n?: number
  /** Row, column and value of the elements that are not zero. */
  elements?: [number, number, number][]
  /** Elements that stand where an earlier one stands. */
  repeated?: number
  refused?: string
}

const folder = join(import.meta.dirname, '../fixtures/numpy')
const { files, ...versions } = JSON.parse(readFileSync(join(folder, 'expected.json'), 'utf8')) as {
  numpy: string
  scipy: string
  files: Record<string, Expected>
}
const named = (ending: RegExp): [string, Expected][] => Object.entries(files).filter(([name]) => ending.test(name))
const fileOf = (name: string): Uint8Array => readFileSync(join(folder, name))

/** The upper triangle of Q + Qᵀ, and the diagonal of Q, as text a pair: a second way to the problem. */
function pairsOf(n: number, elements: [number, number, number][]): { linear: number[]; pairs: [string, number][] } {
  const linear = new Array<number>(n).fill(0)
  const pairs = new Map<string, number>()
  for (const [row, col, value] of elements) {
    const pair = `${Math.min(row, col)} ${Math.max(row, col)}`
    if (row === col) linear[row] = value
    else pairs.set(pair, (pairs.get(pair) ?? 0) + value)
  }
  return { linear, pairs: [...pairs].filter(([, value]) => value !== 0).sort() }
}

function expectHeld(name: string, { n, elements, repeated }: Expected): void {
  const reading = readProblem(fileOf(name))
  const { problem, labels } = reading
  expect(reading.issues, name).toEqual([])
  const { linear, pairs } = pairsOf(n!, elements!)
  expect([...problem!.linear], name).toEqual(linear)
  const found = Array.from(problem!.values, (value, k): [string, number] => [
    `${problem!.rows[k]} ${problem!.cols[k]}`,
    value,
  ])
  expect(found.sort(), name).toEqual(pairs)
  expect(labels).toHaveLength(n!)
  expect(reading).toMatchObject({ form: 'qubo', sense: 'min', duplicatesSummed: repeated ?? 0 })
}

describe(`files of NumPy ${versions.numpy} and SciPy ${versions.scipy}`, () => {
  it('dense arrays hold what NumPy says, to the last bit', () => {
    const readable = named(/\.npy(\.gz)?$/).filter(([, { refused }]) => !refused)
    expect(readable.length).toBeGreaterThan(40)
    for (const [name, expected] of readable) {
      expectHeld(name, expected)
      expect(readProblem(fileOf(name))).toMatchObject({
        format: 'npy',
        container: name.endsWith('.gz') ? 'gzip' : null,
      })
    }
  })

  it('sparse matrices hold what SciPy says, to the last bit', () => {
    const readable = named(/\.npz$/).filter(([, { refused }]) => !refused)
    expect(readable.length).toBeGreaterThan(9)
    for (const [name, expected] of readable) expectHeld(name, expected)
  })

  it('Matrix Market files hold what SciPy says, to the last bit', () => {
    const readable = named(/\.mtx(\.gz)?$/).filter(([, { refused }]) => !refused)
    expect(readable).toHaveLength(5)
    for (const [name, expected] of readable) {
      expectHeld(name, expected)
      expect(readProblem(fileOf(name)).format).toBe('matrix-market')
    }
  })

  it('what cannot be read is refused with the reason and the place', () => {
    const refused = named(/\.(?:np[yz]|mtx)$/).filter((entry) => entry[1].refused)
    expect(refused.length).toBeGreaterThan(20)
    for (const [name, { refused: reason }] of refused) {
      const { problem, issues } = readProblem(fileOf(name))
      expect(problem, name).toBeNull()
      expect(issues[0]!.message, name).toContain(reason)
    }
  })
})
