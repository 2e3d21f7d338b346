import { readFileSync } from 'node:fs'
import Ajv from 'ajv/dist/2020'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ProblemDocument } from '../../../../shared/engine/formats/format'
import { json } from '../../../../shared/engine/formats/json'
import { readProblem } from '../../../../shared/engine/formats/index'
import { createRandom } from '../../../../shared/engine/random'
import { fileOf, textOf } from '../../../fixtures/problems/bytes'
import { randomProblem, real } from '../../../fixtures/problems/random-problem'

const schema = JSON.parse(readFileSync('docs/problem.schema.json', 'utf8')) as Record<string, unknown>
const isValid = new Ajv({ strict: true, strictTuples: false }).compile(schema)

const head = { kind: 'espalier.problem', version: 1, form: 'qubo' }
const readingOf = (document: unknown) => readProblem(fileOf(JSON.stringify(document)), { format: 'json' })
const faultsOf = (document: unknown): string[] => readingOf(document).issues.map(({ message }) => message)

describe('a JSON document', () => {
  it('is read with all its members', () => {
    const document = {
      $schema: 'https://espalier.example/api/schemas/problem.json',
      ...head,
      form: 'ising',
      sense: 'max',
      convention: 'minus',
      offset: 2.5,
      variables: ['b', 10, 'a'],
      linear: [['a', 1]],
      interactions: [
        ['a', 'b', -2],
        ['10', 'b', 3],
        ['b', 10, 0.5],
      ],
    }
    expect(isValid(document)).toBe(true)
    const reading = readingOf(document)
    expect(reading).toMatchObject({ form: 'ising', formSource: 'file', sense: 'max', convention: 'minus', issues: [] })
    expect(reading).toMatchObject({ labels: ['b', '10', 'a'], duplicatesSummed: 1 })
    // Sense and convention each turn coefficients round; the offset turns with the sense alone.
    expect(reading.problem).toMatchObject({
      linear: Float64Array.of(0, 0, 1),
      rows: Uint32Array.of(0, 0),
      cols: Uint32Array.of(1, 2),
      values: Float64Array.of(3.5, -2),
      offset: -2.5,
    })
  })

  it('puts variables that are not listed in numerical order, or in order of appearance', () => {
    expect(readingOf({ ...head, interactions: [[10, 9, 1]] })).toMatchObject({
      labels: ['9', '10'],
      problem: { rows: Uint32Array.of(0), cols: Uint32Array.of(1), values: Float64Array.of(1) },
    })
    expect(readingOf({ ...head, linear: [['b', 1]], interactions: [['a', 'b', 1]] }).labels).toEqual(['b', 'a'])
  })

  it.each<[unknown, string]>([
    [[], '[] is not an object'],
    ['text', '"text" is not an object'],
    [{ ...head, kind: 'other' }, 'kind: must be "espalier.problem", not "other"'],
    [{ ...head, version: 2 }, 'version: must be 1, not 2'],
    [{ ...head, form: undefined }, 'form: must be "qubo" or "ising", not nothing'],
    [{ ...head, sense: 'maximum' }, 'sense: must be "min" or "max", not "maximum"'],
    [{ ...head, convention: 1 }, 'convention: must be "plus" or "minus", not 1'],
    [{ ...head, offset: '1' }, 'offset: "1" is not a number'],
    [{ ...head, interaction: [] }, '"interaction": is no member of a problem document'],
    [{ ...head, variables: {} }, 'variables: {} is not a list'],
    [{ ...head, variables: ['a', 'a'] }, 'variables[1]: "a" stands in the list twice'],
    [{ ...head, variables: ['a', 1.5] }, 'variables[1]: 1.5 is no label'],
    [{ ...head, variables: ['a', ' '] }, 'variables[1]: a label is empty'],
    [{ ...head, variables: ['a', 'A'] }, '(variable 0) and "A" (variable 1) differ only in upper and lower case'],
    [{ ...head, variables: ['a'], linear: [['b', 1]] }, 'linear[0][0]: "b" is not among the variables'],
    [{ ...head, linear: { a: 1 } }, 'linear: {"a":1} is not a list'],
    [{ ...head, linear: [['a', 1], ['b']] }, 'linear[1]: expected [label, value], found ["b"]'],
    [{ ...head, interactions: [['a', 'b', null]] }, 'interactions[0][2]: null is not a number'],
    [{ ...head, interactions: [['a', 'b', 1e200]] }, 'interactions[0][2]: the value is too large'],
    [{ ...head, interactions: [['a', 'b', 1e-200]] }, 'interactions[0][2]: 1e-200 is too close to zero'],
    [{ ...head, interactions: [['a', 'a', 1]] }, 'interactions[0]: joins "a" with itself: put it under "linear"'],
    [
      {
        ...head,
        interactions: [
          ['a', 1, 1],
          ['1', 1, 1],
        ],
      },
      'interactions[1]: joins "1" with itself',
    ],
    [head, 'the document names no variables'],
    [{ ...head, convention: 'minus', linear: [['a', 1]] }, 'belongs to the Ising form'],
  ])('%j is refused', (document, reason) => {
    expect(faultsOf(document)[0]).toContain(reason)
    expect(readingOf(document).problem).toBeNull()
  })

  it('is refused when it is no JSON, or no text', () => {
    const { issues } = readProblem(fileOf('{"kind": '), { format: 'json' })
    expect(issues[0]!.message).toContain('the file is not valid JSON: ')
    const bytes = Uint8Array.of(0x7b, 0xff, 0x7d)
    expect(readProblem([bytes], { format: 'json' }).issues[0]!.message).toContain('not UTF-8 text')
    expect(faultsOf({ ...head, interactions: Array.from({ length: 100 }, () => null) })).toHaveLength(20)
  })

  it('is told from other texts by its first brace, for certain by its kind', () => {
    expect(json.sniff(fileOf(`\n {"kind": "espalier.problem"}`)[0]!)).toBe(1)
    expect(json.sniff(fileOf('{}')[0]!)).toBe(0.9)
    expect(json.sniff(fileOf('1 2 3')[0]!)).toBe(0)
  })
})

describe('the published JSON Schema', () => {
  it('describes what is written', () => {
    for (let seed = 0; seed < 20; seed++) {
      const problem = randomProblem(createRandom(seed), 1 + seed, 0.4, real)
      const labels = Array.from(problem.linear.keys(), (i) => (seed % 2 ? `berth ${i}` : `${i}`))
      const document: ProblemDocument = { form: seed % 3 ? 'qubo' : 'ising', labels, problem, sense: 'max' }
      const written: unknown = JSON.parse(textOf(json.write(document)))
      expect(isValid(written), JSON.stringify(isValid.errors)).toBe(true)
    }
  })

  it('allows every document that is read', () => {
    const rarely = <T>(usual: fc.Arbitrary<T>, odd: fc.Arbitrary<unknown>) =>
      fc.oneof({ arbitrary: usual, weight: 9 }, { arbitrary: odd, weight: 1 })
    const label = rarely(fc.constantFrom('a', 'b', 1, 2), fc.oneof(fc.string({ maxLength: 2 }), fc.constantFrom(1.5)))
    const number = rarely(fc.integer(), fc.oneof(fc.double(), fc.constantFrom('1', null)))
    const list = (...items: fc.Arbitrary<unknown>[]) =>
      rarely(fc.array(fc.tuple(...items), { minLength: 1, maxLength: 3 }), number)
    const document = fc.record(
      {
        kind: rarely(fc.constant('espalier.problem'), fc.constant('other')),
        version: rarely(fc.constant(1), fc.constant('1')),
        form: rarely(fc.constantFrom('qubo', 'ising'), fc.constant('QUBO')),
        sense: rarely(fc.constantFrom('min', 'max'), fc.constant('')),
        convention: rarely(fc.constantFrom('plus', 'minus'), fc.constant(0)),
        offset: number,
        variables: rarely(fc.constantFrom(['a', 'b', 1, 2], ['2', '1', 'b', 'a']), fc.array(label, { maxLength: 4 })),
        linear: list(label, number),
        interactions: list(label, label, number),
      },
      { requiredKeys: ['kind', 'version', 'form'] },
    )
    let read = 0
    fc.assert(
      fc.property(document, (candidate) => {
        const plain: unknown = JSON.parse(JSON.stringify(candidate))
        if (!readingOf(plain).problem) return
        read++
        expect(isValid(plain), JSON.stringify(isValid.errors)).toBe(true)
      }),
      { seed: 1, numRuns: 800 },
    )
    expect(read).toBeGreaterThan(80)
  })
})
