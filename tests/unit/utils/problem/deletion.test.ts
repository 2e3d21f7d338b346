import { describe, expect, it } from 'vitest'
import type { EmbeddingOfProblem } from '../../../../shared/schemas/problems'
import { goesWith } from '../../../../utils/problem/deletion'

const embedding = (number: number, runSheets: EmbeddingOfProblem['runSheets'] = []) =>
  ({ number, machine: 'Alder', runSheets }) as EmbeddingOfProblem

describe('goesWith', () => {
  it('is empty when nothing was built on the problem', () => {
    expect(goesWith([])).toEqual([])
  })

  it('names embeddings, run sheets and samples', () => {
    const sheets = [{ id: 'r', number: 7, state: 'returned' as const }]
    expect(goesWith([embedding(2), embedding(1, sheets)])).toEqual([
      '2 embeddings: E-2 on Alder, E-1 on Alder',
      '1 run sheet: RS-7 (returned)',
      'all rehearsals and returned samples of these run sheets',
    ])
  })

  it('counts what it does not name', () => {
    const many = Array.from({ length: 9 }, (_, index) => embedding(index + 1))
    expect(goesWith(many)).toEqual([expect.stringMatching(/^9 embeddings: E-1 .* E-6 on Alder and more$/)])
  })
})
