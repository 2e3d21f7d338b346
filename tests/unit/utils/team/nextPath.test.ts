import { describe, expect, it } from 'vitest'
import { nextPath } from '../../../../utils/team/nextPath'

describe('nextPath', () => {
  it.each(['/machines', '/problems/7?part=linear#structure', '/run-sheets/a%20b'])('keeps %s', (path) => {
    expect(nextPath(path)).toBe(path)
  })

  it.each([
    'https://elsewhere.example',
    '//elsewhere.example',
    '/\\elsewhere.example',
    '/\t/elsewhere.example',
    '/.//elsewhere.example',
    'javascript:alert(1)',
    'machines',
    '/sign-in',
    '/sign-in?next=/sign-in',
    '',
    undefined,
    ['/machines'],
  ])('refuses %j', (path) => {
    expect(nextPath(path)).toBe('/')
  })
})
