import { expect, it } from 'vitest'
import { passkeyObstacle, passkeyRefusal } from '../../../../utils/team/passkeys'

const here = { isSecure: true, hostname: 'espalier.example', isKnown: true }

it.each([
  [{}, undefined],
  [{ hostname: 'localhost' }, undefined],
  [{ isSecure: false }, /HTTPS/],
  [{ hostname: '127.0.0.1' }, /a name/],
  [{ hostname: '[::1]' }, /a name/],
  [{ isKnown: false }, /This browser/],
])('says what stands in the way at %o', (place, expected) => {
  const said = passkeyObstacle({ ...here, ...place })
  if (expected) expect(said).toMatch(expected)
  else expect(said).toBeUndefined()
})

it('says what it means that a browser gave none', () => {
  expect(passkeyRefusal(new DOMException('', 'NotAllowedError'))).toMatch(/declined/)
  expect(passkeyRefusal(new TypeError('x'))).toMatch(/Try again/)
  expect(passkeyRefusal('x')).toMatch(/Try again/)
})
