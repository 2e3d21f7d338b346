import { describe, expect, it } from 'vitest'
import type { RemarkView, RunSheetState } from '../../../../shared/schemas/run-sheets'
import { signOffSteps } from '../../../../utils/run-sheet/signOff'

const ida = { id: 'a', name: 'Ida Fenn' }
const maud = { id: 'b', name: 'Maud Okafor' }
const said = (what: string, at: string, by: RemarkView['by']): RemarkView => ({
  what,
  at,
  by,
  for: null,
  text: '',
  mentions: [],
})
const steps = (state: RunSheetState, remarks: RemarkView[]) =>
  signOffSteps({ state, remarks, preparedBy: ida, createdAt: '2026-12-01T08:00:00Z' })

describe('signOffSteps', () => {
  it('shows who prepared a draft, and nothing else', () => {
    const { prepared, reviewed, issued } = steps('draft', [])
    expect(prepared).toEqual({ name: 'Ida Fenn', what: 'prepared', at: '2026-12-01T08:00:00Z' })
    expect([reviewed, issued]).toEqual([null, null])
  })

  it('forgets an earlier refusal while the sheet is in review again', () => {
    const remarks = [
      said('submitted for review', '1', ida),
      said('sent back', '2', maud),
      said('submitted for review', '3', ida),
    ]
    expect(steps('sent back', remarks.slice(0, 2)).reviewed).toMatchObject({ name: 'Maud Okafor', what: 'sent back' })
    expect(steps('in review', remarks)).toMatchObject({ prepared: { at: '3' }, reviewed: null })
  })

  it('takes the last approval, and names nobody who left', () => {
    expect(steps('approved', [said('sent back', '1', maud), said('approved', '2', null)]).reviewed).toEqual({
      name: 'someone who left',
      what: 'approved',
      at: '2',
    })
  })
})
