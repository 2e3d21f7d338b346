import { describe, expect, it } from 'vitest'
import { networkOf, RateLimiter } from '../../../../server/rate-limit/limiter'
import { rateSettingsOf } from '../../../../server/rate-limit/settings'

it('counts by address until a credential was found to be good, then by itself', () => {
  const limiter = new RateLimiter({ caller: 2, address: 3 })
  expect(limiter.count('Bearer a', '192.0.2.1', 0)).toMatchObject({ policy: 'address', remaining: 2, perMinute: 3 })
  limiter.accept('Bearer a')
  expect(limiter.count('Bearer a', '192.0.2.1', 0)).toMatchObject({ policy: 'caller', remaining: 1, perMinute: 2 })
  for (const guess of ['b', 'c', 'd']) limiter.count(`Bearer ${guess}`, '192.0.2.1', 0)
  expect(limiter.count('Bearer e', '192.0.2.1', 0)).toMatchObject({ policy: 'address', allowed: false })
  expect(limiter.count(undefined, '192.0.2.1', 0)).toMatchObject({ allowed: false })
  expect(limiter.count(undefined, '192.0.2.2', 0)).toMatchObject({ allowed: true })
  expect(limiter.count('Bearer a', '192.0.2.9', 0)).toMatchObject({ allowed: true, remaining: 0 })
  expect(limiter.count('Bearer a', '192.0.2.9', 0)).toMatchObject({ allowed: false })
})

it('counts nothing where there is no limit', () => {
  const limiter = new RateLimiter({ caller: null, address: null })
  limiter.accept('Bearer a')
  expect(limiter.count('Bearer a', '192.0.2.1', 0)).toBeNull()
  expect(limiter.count(undefined, '192.0.2.1', 0)).toBeNull()
})

describe('the network of an address', () => {
  // 64 bits: RFC 4291, section 2.5.4; ways to write an address: section 2.2.
  it.each([
    ['192.0.2.1', '192.0.2.1'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
    ['2001:DB8:0001:2::6', '2001:db8:1:2::/64'],
    ['2001:db8::6', '2001:db8:0:0::/64'],
    ['::1', '0:0:0:0::/64'],
    ['fe80::1%eth0', 'fe80:0:0:0::/64'],
    ['unknown', 'unknown'],
  ])('of %s is %s', (address, network) => expect(networkOf(address)).toBe(network))
})

describe('the settings', () => {
  it('have presets, and 0 for no limit', () => {
    expect(rateSettingsOf({})).toEqual({ caller: 1200, address: 300 })
    expect(rateSettingsOf({ RATE_LIMIT: '0', RATE_LIMIT_ADDRESS: '7' })).toEqual({ caller: null, address: 7 })
  })
  it.each(['-1', '1.5', 'many', '1000001'])('refuse %s', (text) =>
    expect(() => rateSettingsOf({ RATE_LIMIT: text })).toThrow(/^RATE_LIMIT is .*whole number/),
  )
})
