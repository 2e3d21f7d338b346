import { describe, expect, it } from 'vitest'
import type { EmbeddingProgress } from '../../../../shared/schemas/embeddings'
import type { JobView } from '../../../../shared/schemas/jobs'
import { bestWords, courseCharts, progressOf, workWords } from '../../../../utils/embedding/progress'

const progress: EmbeddingProgress = {
  method: 'search',
  tryNumber: 3,
  phase: 'rerouting',
  overlap: 4,
  tries: 8,
  running: 2,
  longestChain: 6,
  qubitsUsed: 1281,
  seconds: 2,
  trace: [],
}

describe('progressOf', () => {
  it('is nothing until the search has reported', () => {
    expect(progressOf(null)).toBeNull()
    expect(progressOf({ detail: {} } as JobView)).toBeNull()
    expect(progressOf({ detail: { ...progress } } as unknown as JobView)).toEqual(progress)
  })
})

describe('words', () => {
  it('say what is at work and how good the best is', () => {
    expect(workWords(progress)).toBe('Search, try 3 of 8, rerouting chains that overlap; 2 tries at work')
    expect(workWords({ ...progress, method: 'repair', tries: 1, running: 1, phase: 'mending' })).toBe('Repair, mending')
    expect(bestWords(progress)).toBe('best so far: longest chain 6, 1\u202f281 qubits')
    expect(bestWords({ longestChain: null, qubitsUsed: null })).toBe('none valid so far')
  })
})

describe('courseCharts', () => {
  const moment = (seconds: number, overlap: number, longestChain: number | null) => ({
    seconds,
    overlap,
    longestChain,
    qubitsUsed: longestChain && 10 * longestChain,
  })

  it('draws each figure from when there is one', () => {
    const charts = courseCharts([moment(0, 9, null), moment(1, 0, 5)])
    expect(charts.map(({ series }) => series.points)).toEqual([
      [
        { x: 0, y: 9 },
        { x: 1, y: 0 },
      ],
      [{ x: 1, y: 5 }],
      [{ x: 1, y: 50 }],
    ])
  })

  it('says why there is nothing to draw', () => {
    expect(courseCharts([])[0]!.instead).toBe('Nothing reported yet.')
    expect(courseCharts([moment(0, 9, null)])[1]!.instead).toBe('No valid embedding yet.')
    const [overlap] = courseCharts([moment(0, 0, 5), moment(1, 0, 4)])
    expect(overlap).toMatchObject({ series: { points: [] }, instead: 'None: the chains are valid throughout.' })
  })
})
