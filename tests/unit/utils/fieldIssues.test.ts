import { describe, expect, it } from 'vitest'
import { fieldIssues } from '../../../utils/fieldIssues'

describe('fieldIssues', () => {
  it('gives each field its first issue as a sentence and keeps the rest', () => {
    const other = { path: 'workspace.plan', message: 'is not known' }
    const issues = [
      { path: 'name', message: 'give your name' },
      { path: 'name', message: 'too long' },
      { path: 'code', message: 'Already used.' },
      other,
    ]
    expect(fieldIssues(issues, ['name', 'code', 'email'])).toEqual({
      byField: { name: 'Give your name.', code: 'Already used.' },
      others: [other],
    })
  })
})
