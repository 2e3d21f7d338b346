import { describe, expect, it } from 'vitest'
import type { FirstStepsDone } from '../../../shared/schemas/first-steps'
import { firstSteps, stepsNote } from '../../../utils/first-steps'

const NOTHING: FirstStepsDone = { problem: null, embedding: null, runSheet: null, rehearsal: null, submission: null }
const ALL: FirstStepsDone = {
  problem: { id: 'p', number: 4, name: 'Small' },
  embedding: { id: 'e', number: 1, problem: 'Small' },
  runSheet: { id: 's', number: 3 },
  rehearsal: { id: 'r', number: 1, runSheet: 3 },
  submission: { id: 's', number: 3 },
}

describe('firstSteps', () => {
  it('begins with a new problem; a step waits for the one that it needs', () => {
    const rows = firstSteps(NOTHING, null)
    expect(rows.map(({ to }) => to)).toEqual(['/problems/new', null, null, null, null])
    expect(stepsNote(rows)).toBe('0 of 5 done')
  })

  it('lets any problem be embedded', () => {
    expect(firstSteps(NOTHING, 'other')[1]).toMatchObject({ to: '/problems/other/embed', isDone: false })
    expect(firstSteps({ ...NOTHING, problem: ALL.problem }, 'other')[1]!.to).toBe('/problems/p/embed')
  })

  it('leads each step to the page where it is done', () => {
    const rows = firstSteps({ ...ALL, rehearsal: null, submission: null }, null)
    expect(rows.map(({ isDone }) => isDone)).toEqual([true, true, true, false, false])
    expect(rows.slice(3).map(({ to }) => to)).toEqual(['/run-sheets/s#samples', '/run-sheets/s#sign-off'])
    expect(firstSteps({ ...NOTHING, embedding: ALL.embedding }, null)[2]!.to).toBe('/embeddings/e')
  })

  it('ticks what was done whatever the order, and leads to it', () => {
    const rows = firstSteps(ALL, null)
    expect(rows.map(({ to }) => to)).toEqual([
      '/problems/p',
      '/embeddings/e',
      '/run-sheets/s',
      '/returns/r',
      '/run-sheets/s',
    ])
    expect(rows.map(({ link }) => link)).toEqual(['P-4', 'E-1 of Small', 'RS-3', 'Rehearsal 1 of RS-3', 'RS-3'])
    expect(stepsNote(rows)).toBe('all done')
    expect(firstSteps({ ...NOTHING, submission: ALL.submission }, null).map(({ isDone }) => isDone)).toEqual([
      false,
      false,
      false,
      false,
      true,
    ])
  })
})
