import { describe, expect, it } from 'vitest'
import type { GroupsView, GroupView, PenaltyView } from '../../../../shared/schemas/groups'
import { saveGroupsSchema } from '../../../../shared/schemas/groups'
import { explain } from '../../../../utils/help/registry'
import {
  groupColumns,
  groupsCsv,
  groupsSentence,
  labelsOf,
  memberWords,
  notAmong,
  pairsWords,
  requestOf,
  verdictOf,
  withFreshNames,
} from '../../../../utils/problem/groups'

const penalty: PenaltyView = {
  weight: 10,
  pairs: 3,
  pairsDeviating: 1,
  greatestDeviation: 2.5,
  overlaps: 0,
  single: 2,
  sufficient: 2.5,
  verdict: 'larger than needed',
}
const group = (name: string, members: string[], more: Partial<GroupView> = {}): GroupView => ({
  name,
  kind: 'exactly',
  k: 1,
  members,
  source: 'recognised',
  penalty,
  ...more,
})
const view = (more: Partial<GroupsView>): GroupsView => ({
  problemVersion: 2,
  variables: 9,
  recognised: [group('mar', ['a', 'b', 'c'])],
  complete: true,
  confirmed: null,
  fingerprint: '',
  seconds: 0,
  version: '',
  ...more,
})

describe('groups on the page', () => {
  it('say the verdict with a word, and by what factor a penalty is too large', () => {
    expect(verdictOf(penalty)).toEqual({ mark: 'computed', word: 'larger than needed, 4×' })
    expect(verdictOf({ ...penalty, sufficient: 0 })).toEqual({ mark: 'computed', word: 'larger than needed' })
    expect(verdictOf({ ...penalty, verdict: 'may be too weak' })?.mark).toBe('caution')
    expect(verdictOf({ ...penalty, verdict: null })).toBeNull()
    expect(pairsWords(penalty)).toBe('1 of 3 pairs differ, by up to 2.5')
  })

  it('explain each number as it is shown', () => {
    const shown = groupColumns([group('mar', ['a', 'b', 'c'])]).map(({ cases }) => explain(cases()[0]!.help).result)
    expect(shown).toEqual(['10', '2', '2.5'])
    expect(groupColumns([group('x', ['a', 'b'], { penalty: null })])[0].cases()).toEqual([])
  })

  it('tell recognised ones that are not among the confirmed, whatever their names and order', () => {
    const known = [group('other name', ['c', 'b', 'a'])]
    expect(notAmong(known, [group('mar', ['a', 'b', 'c']), group('tea', ['d', 'e', 'f'])])).toMatchObject([
      { name: 'tea' },
    ])
    expect(withFreshNames([group('tea', ['x', 'y'])], [group('tea', ['d', 'e'])])).toMatchObject([{ name: 'tea 2' }])
  })

  it('read labels one a line or between commas, spaces kept', () => {
    expect(labelsOf('berth A, berth B\n\n berth C \n')).toEqual(['berth A', 'berth B', 'berth C'])
    expect(memberWords(['a', 'b', 'c'], 2)).toBe('a, b and 1 more')
  })

  it('sum up in a sentence', () => {
    expect(groupsSentence(view({}))).toContain('1 group recognised in the coefficients')
    const weak = group('mar', ['a', 'b'], { penalty: { ...penalty, verdict: 'may be too weak' } })
    expect(groupsSentence(view({ confirmed: [weak], complete: false }))).toMatch(
      /1 group confirmed\. 1 with .* Not all/,
    )
  })

  it('are sent without their figures, as the route takes them', () => {
    const request = requestOf([group('mar', ['a', 'b'])], 2)
    expect(saveGroupsSchema.parse(request)).toEqual({
      version: 2,
      groups: [{ name: 'mar', kind: 'exactly', k: 1, members: ['a', 'b'], source: 'recognised' }],
    })
  })

  it('are written as CSV, a line a member', () => {
    expect(groupsCsv([group('mar, tea', ['a', 'b"'])])).toBe(
      'group,kind,k,variable\n"mar, tea",exactly,1,a\n"mar, tea",exactly,1,"b"""\n',
    )
  })
})
