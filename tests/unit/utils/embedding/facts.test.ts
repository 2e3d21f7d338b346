import { describe, expect, it } from 'vitest'
import type { EmbeddingView } from '../../../../shared/schemas/embeddings'
import { embeddingFacts } from '../../../../utils/embedding/facts'

const noteOf = (view: Partial<EmbeddingView>) =>
  embeddingFacts(
    {
      problem: { variables: 5, interactions: 10 },
      machine: { qubits: 128, family: 'C(4)' },
      method: 'auto',
      methodUsed: null,
      tryNumber: null,
      seed: 3,
      tries: 8,
      triesPlanned: 16,
      timeLimitSeconds: 30,
      seconds: 2,
      unmet: null,
      ...view,
    } as EmbeddingView,
    null,
  ).find(({ label }) => label === 'Method')!.note

const found: Partial<EmbeddingView> = {
  status: 'found',
  methodUsed: 'template',
  tryNumber: 11,
  stats: {
    chainLength: { min: 1, mean: 2, max: 3 },
    qubitsUsed: 10,
    couplersUsed: 17,
    chainCouplers: 5,
    interactionCouplers: 12,
    unusedShare: 0.9,
    lengthHistogram: [0, 2, 1, 2],
  },
}

describe('the tries of an embedding', () => {
  it('are those of all methods together', () => {
    expect(noteOf({ status: 'none found' })).toBe('16 tries, seed 3')
    expect(noteOf(found)).toMatch(/^try 11 of 16, seed 3, /)
    expect(noteOf({ ...found, tryNumber: 1, tries: 1, triesPlanned: 1 })).toMatch(/^seed 3, /)
  })

  it('are those of each method before the search has told how many there are', () => {
    expect(noteOf({ status: 'running', triesPlanned: null })).toBe('8 tries of each method, seed 3')
    expect(noteOf({ status: 'running', method: 'lines', triesPlanned: 8 })).toBe('8 tries, seed 3')
  })
})
