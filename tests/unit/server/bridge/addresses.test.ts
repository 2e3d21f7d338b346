import { describe, expect, it } from 'vitest'
import { addressRules } from '../../../../server/bridge/addresses'

const REFUSED: Record<string, string[]> = {
  'this network': ['0.0.0.0', '0.1.2.3', '::'],
  private: ['10.0.0.1', '10.255.255.255', '172.16.0.1', '172.31.255.255', '192.168.0.1', '192.168.255.255'],
  'shared by providers': ['100.64.0.1', '100.127.255.255'],
  loopback: ['127.0.0.1', '127.255.255.255', '::1'],
  'link-local': ['169.254.0.1', 'fe80::1', 'febf::1'],
  metadata: ['169.254.169.254', 'fd00:ec2::254'],
  'unique-local': ['fc00::1', 'fdff:ffff::1'],
  'site-local': ['fec0::1'],
  multicast: ['224.0.0.1', '239.255.255.255', 'ff02::1'],
  reserved: ['240.0.0.1', '255.255.255.255', '192.0.0.8', '4000::1'],
  examples: ['192.0.2.1', '198.51.100.1', '203.0.113.1', '2001:db8::1', '3fff::1'],
  benchmarks: ['198.18.0.1', '198.19.255.255'],
  'IPv4 mapped into IPv6': ['::ffff:10.0.0.1', '::ffff:7f00:1', '::ffff:169.254.169.254', '::ffff:8.8.8.8'],
  'IPv4 through IPv6': ['2002:7f00:1::', '64:ff9b::7f00:1', '2001::1', '::127.0.0.1'],
  'no address': ['', 'localhost', 'fe80::1%eth0', '127.1', '0x7f000001', '2606:4700::1111%1'],
}

describe('an address', () => {
  it.each(Object.entries(REFUSED))('that is %s is refused', (_, addresses) => {
    const rules = addressRules('')
    expect(addresses.filter((address) => rules.verdictOn(address) !== 'refused')).toEqual([])
  })

  it('of the public internet may be called', () => {
    const rules = addressRules('')
    for (const address of ['8.8.8.8', '172.32.0.1', '100.128.0.1', '192.169.0.1', '2606:4700::1111', '2a00:1450::1'])
      expect(rules.verdictOn(address), address).toBe('public')
  })

  it('may be called all the same where whoever runs the installation names its network', () => {
    const rules = addressRules('10.1.0.0/16, 127.0.0.1  fd12::/32')
    for (const address of ['10.1.2.3', '127.0.0.1', 'fd12::7', '::ffff:10.1.2.3'])
      expect(rules.verdictOn(address), address).toBe('allowed')
    for (const address of ['10.2.0.1', '127.0.0.2', 'fd13::7', '169.254.169.254'])
      expect(rules.verdictOn(address), address).toBe('refused')
  })

  it.each(['10.0.0.0/33', '10.0.0', 'bridge.local', '10.0.0.0/', 'fd00::/129', '10.0.0.0/8.5'])(
    'is not named by %s, which is said',
    (network) => {
      expect(() => addressRules(network)).toThrow(`BRIDGE_PRIVATE_ADDRESSES has ${network},`)
    },
  )
})
