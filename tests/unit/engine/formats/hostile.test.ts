import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gzip } from '../../../../shared/engine/formats/archive'
import type { FileReading, ProblemDocument } from '../../../../shared/engine/formats/format'
import { FORMATS, readProblem, writeProblem } from '../../../../shared/engine/formats/index'
import { createRandom } from '../../../../shared/engine/random'
import { anyDocument, bareDocument, cutDocument } from '../../../fixtures/problems/documents'
import { chunked, mutated } from '../../../fixtures/problems/mutations'

/** Documents that a format can hold. */
const holdable: Record<string, fc.Arbitrary<ProblemDocument>> = { npy: bareDocument, 'max-cut': cutDocument }
const ids = FORMATS.map(({ id }) => id)
const documentsFor = (id: string): fc.Arbitrary<ProblemDocument> => holdable[id] ?? anyDocument

const documentOf = ({ form, labels, problem, sense }: FileReading): unknown => ({ form, labels, problem, sense })

describe.each(ids)('the format %s', (id) => {
  it('reads what it writes to the last bit, detected, packed or not, wherever the chunks are cut', () => {
    fc.assert(
      fc.property(documentsFor(id), fc.nat(), (document, seed) => {
        const { form, labels, problem, sense } = document
        const bytes = writeProblem(id, document)
        const random = createRandom(seed)
        for (const file of [bytes, gzip(bytes)]) {
          const reading = readProblem(chunked(file, random))
          expect(reading.issues).toEqual([])
          expect(reading).toMatchObject({ format: id, rejectedCount: 0, duplicatesSummed: 0 })
          expect(documentOf(reading)).toEqual({ form, labels, problem, sense })
        }
        expect(writeProblem(id, document)).toEqual(bytes)
      }),
      { seed: 1, numRuns: 100 },
    )
  })
})

/** What is wrong with a reading that came of hostile bytes, or null. */
function faultOf({ problem, labels, issues, rejected }: FileReading): string | null {
  if (!problem) return issues.length > 0 ? null : 'no problem and no reason'
  if (issues.length > 0) return 'a problem in spite of issues'
  const { n, linear, rows, cols, values, offset } = problem
  if (n < 1 || labels.length !== n || linear.length !== n || new Set(labels).size !== n) return 'labels'
  if (![offset, ...linear, ...values].every(Number.isFinite)) return 'a value that is not finite'
  for (let k = 0; k < values.length; k++) {
    if (!(rows[k]! < cols[k]! && cols[k]! < n)) return `pair ${k} is out of range`
    if (values[k] === 0) return `pair ${k} is zero`
    if (k > 0 && rows[k - 1]! * n + cols[k - 1]! >= rows[k]! * n + cols[k]!) return `pair ${k} is out of order`
  }
  return rejected.length > 100 ? 'too many lines kept' : null
}

/** Files of every format, some packed. */
function seedFiles(): Uint8Array[] {
  return ids.flatMap((id) =>
    fc
      .sample(documentsFor(id), { seed: 7, numRuns: 20 })
      .map((document, k) => (k % 4 === 3 ? gzip(writeProblem(id, document)) : writeProblem(id, document))),
  )
}

describe('ten thousand damaged files', () => {
  it('never crash, never give half a problem, and are read the same wherever the chunks are cut', () => {
    const random = createRandom(2026)
    const files = seedFiles()
    let readable = 0
    for (let round = 0; round < 10_000; round++) {
      const bytes = mutated(files[random.below(files.length)]!, random)
      const format = random.below(4) === 0 ? ids[random.below(ids.length)] : undefined
      const where = `round ${round}, ${format ?? 'detected'}: ${Buffer.from(bytes).toString('base64')}`
      let reading: FileReading
      try {
        reading = readProblem(bytes, { format })
      } catch (error) {
        throw new Error(where, { cause: error })
      }
      const fault = faultOf(reading)
      if (fault) throw new Error(`${fault}: ${where}`)
      if (reading.problem) readable++
      if (round % 4 === 0) expect(readProblem(chunked(bytes, random), { format }), where).toEqual(reading)
    }
    // Otherwise the damage would be so great that nothing behind the first check is ever reached.
    expect(readable).toBeGreaterThan(500)
  }, 240_000)
})
