import { describe, expect, it } from 'vitest'
import type { EmbeddingOfProblem } from '../../../../shared/schemas/problems'
import { bestValues, COMPARE_KEYS, isFound, onMachine } from '../../../../utils/embedding/compare'

const THIN = '\u202f'

const row = (number: number, max: number, qubitsUsed: number, rest: Partial<EmbeddingOfProblem> = {}) =>
  ({
    id: `e${number}`,
    number,
    status: 'found',
    machineId: 'alder',
    method: 'auto',
    methodUsed: 'lines',
    seed: number,
    seconds: 2,
    stats: { qubitsUsed, chainLength: { max, mean: qubitsUsed / 10, min: 1 }, unusedShare: 1 - qubitsUsed / 100 },
    ...rest,
  }) as EmbeddingOfProblem

describe('onMachine', () => {
  it('keeps to the machine and sets apart what has no chains', () => {
    const rows = [
      row(1, 4, 20),
      row(2, 3, 30, { machineId: 'juniper' }),
      row(3, 0, 0, { status: 'none found', stats: null }),
    ]
    const { found, others } = onMachine(rows, 'alder')
    expect([found.map(({ number }) => number), others.map(({ number }) => number)]).toEqual([[1], [3]])
  })
})

describe('bestValues', () => {
  it('takes the better end of each column, and nothing from a column where all are alike', () => {
    const rows = [row(1, 4, 20), row(2, 3, 30, { seconds: 1.5 }), row(3, 3, 40)].filter(isFound)
    expect(Object.fromEntries(bestValues(rows))).toEqual({
      longest: '3',
      mean: '2.00',
      total: '20',
      unused: `80.0${THIN}%`,
      seconds: `1.5${THIN}s`,
    })
    expect(bestValues([row(1, 4, 20), row(2, 4, 20)].filter(isFound)).size).toBe(0)
    expect(bestValues([row(1, 4, 20)].filter(isFound)).size).toBe(0)
  })

  it('does not count the time of an import', () => {
    const rows = [row(1, 4, 20), row(2, 3, 30, { method: 'imported', seconds: 0 })].filter(isFound)
    expect(bestValues(rows).has('seconds')).toBe(false)
    expect(rows.map(COMPARE_KEYS.seconds!)).toEqual([2, Number.POSITIVE_INFINITY])
  })
})
