import { describe, expect, it } from 'vitest'
import type { ProblemView, ReadingView, UploadedProblem } from '../../../../shared/schemas/problems'
import { problemFacts, readingFacts, readingSentence, structureFacts } from '../../../../utils/problem/reading'

const reading: ReadingView = {
  format: 'coefficients',
  formatTitle: 'coefficient list',
  form: 'ising',
  formSource: 'default',
  convention: 'minus',
  sense: 'max',
  triangle: 'both',
  entriesRead: 4,
  duplicatesSummed: 1,
  zerosDropped: 2,
  firstRows: [],
  rejected: [],
  rejectedCount: 0,
}
const structure: UploadedProblem['structure'] = {
  variables: 3,
  interactions: 1,
  density: 1 / 3,
  degree: { min: 0, mean: 2 / 3, max: 1 },
  degreeHistogram: [],
  linearHistogram: [],
  interactionHistogram: [],
  dynamicRange: 5,
  components: 2,
  isolated: 0,
  treewidthUpperBound: null,
}
const valueOf = (facts: { label: string; value: unknown; note?: string }[], label: string) =>
  facts.find((fact) => fact.label === label)

describe('readingFacts', () => {
  const uploaded = { reading, structure, variables: 3, interactions: 1, offset: -4 } as UploadedProblem

  it('says how the form was known and what the convention means', () => {
    expect(valueOf(readingFacts(uploaded), 'Form')).toMatchObject({ value: 'Ising', note: 'assumed' })
    expect(valueOf(readingFacts(uploaded), 'Convention')!.note).toBe('E = −Σ h s − Σ J s s')
    expect(valueOf(readingFacts(uploaded), 'Sense')!.value).toBe('maximise')
  })

  it('leaves the Ising energy out for a QUBO', () => {
    const qubo = { ...uploaded, reading: { ...reading, form: 'qubo' as const } }
    expect(valueOf(readingFacts(qubo), 'Convention')!.note).toBeUndefined()
  })
})

describe('readingSentence', () => {
  it('names format, shape and form, and only what happened', () => {
    expect(readingSentence(reading)).toBe(
      'coefficient list, both triangles summed, Ising. 4 entries read. 1 duplicate entry summed. 2 pairs came to zero and were dropped.',
    )
    expect(readingSentence({ ...reading, triangle: 'upper', duplicatesSummed: 0, zerosDropped: 0 })).toBe(
      'coefficient list, upper triangle, Ising. 4 entries read.',
    )
  })
})

describe('structureFacts and problemFacts', () => {
  it('says when the treewidth was not sought', () => {
    expect(valueOf(structureFacts(structure), 'Treewidth')).toMatchObject({ value: 'not sought', word: true })
  })

  it('shows isolated variables only when there are some, and the best energy in its sense', () => {
    const problem = { structure, best: 24, sense: 'max' } as ProblemView
    expect(valueOf(problemFacts(problem), 'Isolated')).toBeUndefined()
    expect(valueOf(problemFacts(problem), 'Best energy')).toMatchObject({
      value: '24',
      note: 'highest by majority so far',
    })
    expect(valueOf(problemFacts({ ...problem, best: null }), 'Best energy')!.value).toBe('no samples yet')
  })
})
