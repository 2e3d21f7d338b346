import { describe, expect, it } from 'vitest'
import type { ReferenceItem, ReferencePart } from '../../../../shared/schemas/reference'
import { THIN_SPACE } from '../../../../utils/format'
import { explain } from '../../../../utils/help/registry'
import {
  bestLook,
  failedWords,
  methodCell,
  methodsOf,
  progressOf,
  referenceFacts,
  runningLook,
  sizeWords,
  standingWords,
} from '../../../../utils/problem/reference'

const part: ReferencePart = {
  components: 1,
  variables: 40,
  interactions: 95,
  method: 'tree decomposition',
  by: 'tree decomposition',
  width: 9,
  proved: true,
  gap: 0,
  seconds: 0.2,
}
const look = (change: Partial<ReferenceItem> = {}): ReferenceItem => ({
  id: 'r',
  problemVersion: 1,
  status: 'proved',
  jobId: 'j',
  energy: -201,
  bound: -201,
  gap: 0,
  tolerance: 0,
  method: 'tree decomposition',
  parts: [part],
  isolated: 0,
  optima: null,
  up: { labels: ['a'], total: 1 },
  settings: { seed: 1, timeLimitSeconds: 60, method: null },
  seconds: 1.5,
  version: '0.1.0',
  reason: null,
  createdBy: { id: 'u', name: 'Developer' },
  createdAt: '2026-12-01T12:00:00.000Z',
  ...change,
})

describe('looks for an optimum', () => {
  it('counts a proved one before any other, then the best in the sense of the problem', () => {
    const looks = [
      look({ id: 'running', status: 'running', energy: null }),
      look({ id: 'low', status: 'best found', energy: -300 }),
      look({ id: 'high', status: 'best found', energy: -100 }),
      look({ id: 'proved', energy: -201 }),
    ]
    expect(bestLook(looks, 'min')!.id).toBe('proved')
    expect(bestLook(looks.slice(0, 3), 'min')!.id).toBe('low')
    expect(bestLook(looks.slice(0, 3), 'max')!.id).toBe('high')
    expect(bestLook(looks.slice(0, 1), 'min')).toBeUndefined()
    expect(runningLook(looks)!.id).toBe('running')
  })

  it('says that the newest came to nothing', () => {
    expect(failedWords([look({ status: 'failed', reason: 'out of memory' }), look()])).toMatch(/out of memory/)
    expect(failedWords([look({ status: 'cancelled' })])).toMatch(/cancelled/)
    expect(failedWords([look(), look({ status: 'failed' })])).toBeNull()
    expect(failedWords([])).toBeNull()
  })
})

describe('the strip', () => {
  it('has a bound and a gap only where the value is not proved', () => {
    expect(referenceFacts(look(), 'min').map(({ label }) => label)).toEqual(['Lowest energy', 'Outcome', 'Took'])
    const open = look({ status: 'best found', bound: -230, gap: 29, optima: 4 })
    const facts = referenceFacts(open, 'max')
    expect(facts.map(({ label, value }) => [label, value])).toEqual([
      ['Highest value', '−201'],
      ['Outcome', 'best found'],
      ['Not above', '−230'],
      ['Gap', '29'],
      ['States that have it', '4'],
      ['Took', `1.5${THIN_SPACE}s`],
    ])
  })

  it('reads as its explanations do', () => {
    for (const fact of referenceFacts(look({ status: 'best found', bound: -230.5, gap: 29.5 }), 'min'))
      if (fact.help) expect(`${fact.label} ${explain(fact.help).result}`).toBe(`${fact.label} ${fact.value}`)
  })

  it('names what proved rounding leaves open', () => {
    expect(referenceFacts(look({ tolerance: 3e-12 }), 'min')[1]!.note).toMatch(/within 3/)
  })
})

describe('words', () => {
  it('describe components and how they were solved', () => {
    expect(sizeWords(part)).toBe('40 variables, 95 interactions')
    expect(sizeWords({ ...part, components: 12 })).toBe('12 components of at most 40 variables')
    expect(methodCell(part)).toBe('tree decomposition, width 9')
    const open = { ...part, width: null, method: 'integer programme', by: 'annealing', proved: false } as const
    expect(methodCell(open)).toBe('integer programme; state by annealing')
    expect(methodsOf({ parts: [part, part, open] })).toEqual(['tree decomposition', 'annealing'])
  })

  it('tell where a running look stands', () => {
    const progress = {
      best: -5,
      bound: -9,
      doing: 'annealing 40 variables',
      components: 3,
      solved: 1,
      limitSeconds: 60,
    }
    expect(standingWords(progress, 'min')).toBe(
      'Best −5, not below −9. Annealing 40 variables; 1 of 3 components done.',
    )
    expect(standingWords({ ...progress, best: null, components: 1 }, 'max')).toBe(
      'No state yet, not above −9. Annealing 40 variables.',
    )
    expect(progressOf(null)).toBeNull()
  })
})
