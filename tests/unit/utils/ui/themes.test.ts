import { describe, expect, it } from 'vitest'
import { isThemeChoice, themeShown } from '../../../../utils/ui/themes'

const DARK = '(prefers-color-scheme: dark)'
const MORE = '(prefers-contrast: more)'
const FORCED = '(forced-colors: active)'

describe('themeShown', () => {
  it.each([
    [undefined, [], 'light'],
    [undefined, [DARK], 'dark'],
    [undefined, [MORE], 'contrast-light'],
    [undefined, [DARK, FORCED], 'contrast-dark'],
    ['light', [DARK], 'light'],
    ['dark', [], 'dark'],
    ['light', [DARK, MORE], 'contrast-light'],
    ['dark', [FORCED], 'contrast-dark'],
    ['contrast-light', [DARK], 'contrast-light'],
    ['contrast-dark', [], 'contrast-dark'],
  ] as const)('%s where the system asks for %j is %s', (chosen, asked, shown) => {
    expect(themeShown(chosen, (query) => (asked as readonly string[]).includes(query))).toBe(shown)
  })
})

it('takes no other word from a cookie', () => {
  expect(['system', 'contrast-dark'].every(isThemeChoice)).toBe(true)
  expect(['', 'neon', undefined, 3].some(isThemeChoice)).toBe(false)
})
