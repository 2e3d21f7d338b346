import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../../shared/errors'
import { renamedLabels, renameRemark } from '../../../../server/services/problem-labels'

const labels = ['a', 'b', 'berth 3', '7']
const rename = (from: string, to: string) => ({ from, to })

function refusal(renames: { from: string; to: string }[]): DomainError {
  try {
    renamedLabels(labels, renames)
  } catch (error) {
    if (error instanceof DomainError) return error
  }
  throw new Error('nothing was refused')
}

describe('renaming variables', () => {
  it('changes labels in their places', () => {
    expect(renamedLabels(labels, [rename('b', ' β '), rename('7', 'seven')])).toEqual(['a', 'β', 'berth 3', 'seven'])
    expect(renamedLabels(labels, [rename('a', 'A')])).toEqual(['A', 'b', 'berth 3', '7'])
  })

  it.each([
    ['an unknown variable', [rename('x', 'y')], 'renames.0.from', /no variable “x”/],
    ['nothing', [rename('', 'y')], 'renames.0.from', /name the variable/],
    ['an empty label', [rename('a', '  ')], 'renames.0.to', /empty/],
    ['a control character', [rename('a', 'x\u0007')], 'renames.0.to', /control/],
    ['the label it has', [rename('a', 'a')], 'renames.0.to', /already/],
    ['another’s label', [rename('a', 'B')], 'renames.0.to', /too like “b”/],
    ['the same number written otherwise', [rename('a', '7.0')], 'renames.0.to', /too like “7”/],
    [
      'a label that its bearer gives up',
      [rename('a', 'b'), rename('b', 'c')],
      'renames.0.to',
      /“b” is the label of another/,
    ],
    ['one label for two', [rename('a', 'c'), rename('b', 'C')], 'renames.1.to', /cannot both/],
    ['a variable renamed twice', [rename('a', 'c'), rename('a', 'd')], 'renames.1.from', /twice/],
  ])('refuses %s', (_, renames, path, message) => {
    const { code, issues } = refusal(renames)
    expect(code).toBe('problem.labels')
    expect(issues[0]).toMatchObject({ path, message: expect.stringMatching(message) })
  })

  it('names every one that cannot be made', () => {
    expect(refusal([rename('x', 'y'), rename('a', 'n'), rename('b', '')]).issues).toHaveLength(2)
  })

  it('tells the first few in the remark', () => {
    expect(renameRemark([rename('a', 'b')])).toBe('renamed a to b')
    const five = ['a', 'b', 'c', 'd', 'e'].map((label) => rename(label, `${label}2`))
    expect(renameRemark(five)).toBe('renamed a to a2, b to b2, c to c2 and 2 more')
  })
})
