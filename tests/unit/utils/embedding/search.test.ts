import { describe, expect, it } from 'vitest'
import type { EmbeddingView } from '../../../../shared/schemas/embeddings'
import {
  draftProblems,
  draftSummary,
  freshSeed,
  nextSearch,
  numberProblem,
  SEARCH_BOUNDS,
  settingsOf,
  startDraft,
  tooSmall,
} from '../../../../utils/embedding/search'

describe('tooSmall', () => {
  it('says by how much, of whichever count is short', () => {
    expect(tooSmall({ variables: 12, interactions: 5 }, { qubits: 10, couplers: 9 })).toBe(
      '2 qubits too few for 12 variables',
    )
    expect(tooSmall({ variables: 10, interactions: 12 }, { qubits: 10, couplers: 9 })).toBe(
      '3 couplers too few for 12 interactions',
    )
    expect(tooSmall({ variables: 10, interactions: 9 }, { qubits: 10, couplers: 9 })).toBeNull()
  })
})

describe('numberProblem', () => {
  it('holds a number to its bounds', () => {
    expect(numberProblem('Tries', 1, SEARCH_BOUNDS.tries, true)).toBeUndefined()
    expect(numberProblem('Tries', 0, SEARCH_BOUNDS.tries, true)).toMatch(/lies from 1 to/)
    expect(numberProblem('Tries', 1.5, SEARCH_BOUNDS.tries, true)).toMatch(/whole/)
    expect(numberProblem('Tries', null, SEARCH_BOUNDS.tries, true)).toMatch(/not given/)
  })
})

describe('the form', () => {
  const draft = { ...startDraft(3), longestChain: 6 }

  it('leaves targets out where nothing is typed and names what is wrong otherwise', () => {
    expect(Object.values(draftProblems(draft)).filter(Boolean)).toEqual([])
    expect(settingsOf(draft)).toEqual({
      method: 'auto',
      seed: 3,
      tries: 8,
      timeLimitSeconds: 30,
      objective: 'longest chain',
      target: { longestChain: 6, totalQubits: undefined },
    })
    const wrong = draftProblems({ ...draft, tries: null, longestChain: 0.5, totalQubits: Number.NaN })
    expect(Object.keys(wrong).filter((key) => wrong[key as keyof typeof wrong])).toEqual([
      'tries',
      'longestChain',
      'totalQubits',
    ])
  })

  it('says in one line what is set out of sight', () => {
    expect(draftSummary(startDraft(3))).toBe('seed 3, 8 tries, longest chain minimised first, no early stop')
    expect(draftSummary({ ...draft, seed: Number.NaN, objective: 'total qubits', totalQubits: 1 })).toBe(
      'no seed, 8 tries, total of qubits minimised first, stops at a longest chain of 6 and 1 qubit in all',
    )
  })
})

describe('freshSeed', () => {
  it('is one that was not used, even beside the largest', () => {
    expect(freshSeed([])).toBe(1)
    expect(freshSeed([{ seed: 4 }, { seed: Number.MAX_SAFE_INTEGER }, { seed: 2 }])).toBe(5)
  })
})

describe('nextSearch', () => {
  const ended = (status: EmbeddingView['status'], rest: Partial<EmbeddingView> = {}) =>
    nextSearch({
      status,
      method: 'lines',
      seed: 7,
      tries: 8,
      timeLimitSeconds: 30,
      objective: 'total qubits',
      target: { longestChain: null, totalQubits: 90 },
      ...rest,
    } as EmbeddingView)

  it('takes another seed and twice the effort, within the bounds', () => {
    expect(ended('none found')).toEqual({
      method: 'lines',
      seed: 8,
      tries: 16,
      timeLimitSeconds: 60,
      objective: 'total qubits',
      target: { longestChain: undefined, totalQubits: 90 },
    })
    const most = ended('none found', { seed: Number.MAX_SAFE_INTEGER, tries: 900, timeLimitSeconds: 3000 })
    expect(most).toMatchObject({ seed: 0, tries: 1000, timeLimitSeconds: 3600 })
  })

  it('is the same one after it was stopped, and a search from the beginning after a repair', () => {
    expect(ended('cancelled')).toMatchObject({ method: 'lines', seed: 7, tries: 8 })
    expect(ended('none found', { method: 'repair' })).toMatchObject({ method: 'auto', seed: 8 })
  })
})
