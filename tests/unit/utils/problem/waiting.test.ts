import { describe, expect, it } from 'vitest'
import type { RunSheetItem, RunSheetState } from '../../../../shared/schemas/run-sheets'
import { waitingFor } from '../../../../utils/problem/waiting'

const sheet = (number: number, state: RunSheetState): RunSheetItem => ({
  id: `r${number}`,
  number,
  name: 'First run',
  state,
  problem: { id: 'p', number: 1, name: 'Deck radio channels' },
  embedding: { id: 'e', number: 1 },
  machine: { id: 'm', name: 'Alder' },
  reads: 1000,
  machineTimeMilliseconds: 230.2,
  changedAt: `2026-12-0${number}T00:00:00Z`,
})
const sheets = [
  sheet(1, 'draft'),
  sheet(2, 'in review'),
  sheet(3, 'sent back'),
  sheet(4, 'returned'),
  sheet(5, 'approved'),
  sheet(6, 'closed'),
]
const seenBy = (...roles: Parameters<typeof waitingFor>[1]) =>
  waitingFor(sheets, roles).map(({ sheet }) => sheet.number)

describe('waitingFor', () => {
  it('shows each role what only it can take further, newest first', () => {
    expect(seenBy('reviewer')).toEqual([2])
    expect(seenBy('developer')).toEqual([5, 4, 3])
    expect(seenBy('owner', 'reviewer')).toEqual([5, 4, 3, 2])
    expect(seenBy('reader')).toEqual([])
    expect(seenBy('steward')).toEqual([])
  })

  it('calls machine time an estimate', () => {
    expect(waitingFor(sheets, ['reviewer'])[0]!.rest).toContain('(an estimate)')
  })
})
