import { expect, it } from 'vitest'
import { requireGoodPassword } from '../../../../server/services/password-rules'

const owner = { name: 'Ann', email: 'ann@example.org' }

it.each(['1qaz2wsx3edc', 'QWERTY123456', 'administrator', 'Sunshine2026!', '!!123basketball123'])(
  'refuses %s, which is tried first, at its field',
  (password) => {
    expect(() => requireGoodPassword(password, owner)).toThrow(
      expect.objectContaining({ code: 'password.weak', issues: [expect.objectContaining({ path: 'password' })] }),
    )
  },
)

it('takes words that do not belong together', () => {
  expect(() => requireGoodPassword('lichen wall ferry north', owner)).not.toThrow()
})
