import { describe, expect, it } from 'vitest'
import type { EmbeddingOfProblem } from '../../../../shared/schemas/problems'
import { problemWire } from '../../../../utils/problem/wire'

const embedding = (number: number, rest: Partial<EmbeddingOfProblem> = {}): EmbeddingOfProblem => ({
  id: `e${number}`,
  number,
  status: 'found',
  machineId: 'alder',
  machine: 'Alder',
  calibration: 1,
  method: 'search',
  methodUsed: 'search',
  seed: 1,
  objective: 'longest chain',
  chosen: false,
  stats: null,
  longestChain: 4,
  qubitsUsed: 100,
  ofVersion: { version: 1, current: 1, graph: null },
  seconds: 2,
  createdAt: '2026-12-01T00:00:00Z',
  runSheets: [],
  ...rest,
})
const states = (...embeddings: EmbeddingOfProblem[]) =>
  problemWire({ variables: 40, embeddings }).map(({ state }) => state)

describe('problemWire', () => {
  it('begins with a problem only', () => {
    expect(states()).toEqual(['done', 'not yet', 'not yet', 'not yet', 'not yet', 'not yet'])
  })

  it('is under way while a search runs, and after one that found none', () => {
    expect(states(embedding(1, { status: 'running' }))[1]).toBe('under way')
    expect(states(embedding(1, { status: 'none found' }))[1]).toBe('under way')
  })

  it('follows the farthest run sheet, and names the embedding that carries it', () => {
    const older = embedding(1, { runSheets: [{ id: 'r7', number: 7, state: 'returned' }] })
    const newer = embedding(2, { runSheets: [{ id: 'r9', number: 9, state: 'draft' }] })
    const wire = problemWire({ variables: 40, embeddings: [newer, older] })
    expect(wire.map(({ state }) => state)).toEqual(['done', 'done', 'done', 'done', 'done', 'not yet'])
    expect(wire[1]!.note).toBe('E-1')
    expect(wire[3]!.note).toBe('RS-7 returned')
  })

  it('waits for samples once a run sheet is issued', () => {
    const sheet = (state: 'in review' | 'issued') =>
      states(embedding(1, { runSheets: [{ id: 'r1', number: 1, state }] }))
    expect(sheet('in review')).toEqual(['done', 'done', 'under way', 'under way', 'not yet', 'not yet'])
    expect(sheet('issued')).toEqual(['done', 'done', 'done', 'done', 'under way', 'not yet'])
  })
})
