import { expect, it } from 'vitest'
import { passwordFault } from '../../../shared/password-rules'

const owner = { name: 'Rhona Skerry', email: 'rhona.skerry@brackwater.example' }

it.each([
  ['short enough', null],
  ['elevenchars', /at least 12/],
  ['abababababab', /different/],
  ['Rhona-Skerry-2026', /name or the e-mail/],
  ['rhona.skerry@brackwater.example', /name or the e-mail/],
  ['espalier-rhona', /name or the e-mail/],
  ['lichen on a north wall', null],
  ['🌿🌿🌿🌿🌿🌿', /at least 12/],
])('judges %s', (password, fault) => {
  const found = passwordFault(password, owner)
  if (fault) expect(found).toMatch(fault)
  else expect(found).toBeNull()
})
