import { expect, it } from 'vitest'
import { providerRefusal } from '../../../../utils/team/provider'

it('says why nothing was opened, in words of its own', () => {
  expect(providerRefusal('identity.unverified')).toMatch(/confirms no address/)
  expect(providerRefusal('<b>anything</b>')).toBe('The provider’s answer opened nothing here. Begin again.')
  expect(providerRefusal(undefined)).toBeUndefined()
})
