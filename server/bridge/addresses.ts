import { BlockList, isIP } from 'node:net'

/** IPv4 that is not of the public internet, from the IANA registry of special-purpose addresses, and multicast. */
const SPECIAL_V4 = [
  '0.0.0.0/8',
  '10.0.0.0/8',
  '100.64.0.0/10',
  '127.0.0.0/8',
  '169.254.0.0/16',
  '172.16.0.0/12',
  '192.0.0.0/24',
  '192.0.2.0/24',
  '192.88.99.0/24',
  '192.168.0.0/16',
  '198.18.0.0/15',
  '198.51.100.0/24',
  '203.0.113.0/24',
  '224.0.0.0/4',
  '240.0.0.0/4',
]
/** The only public IPv6 there is; within it, what is kept for protocols, for examples, and IPv4 in other clothes. */
const GLOBAL_V6 = ['2000::/3']
const SPECIAL_V6 = ['2001::/23', '2001:db8::/32', '2002::/16', '3fff::/20']

type Family = 'ipv4' | 'ipv6'
const familyOf = (address: string): Family => (isIP(address) === 4 ? 'ipv4' : 'ipv6')

/** @throws Error for what is no network, such as `10.0.0.0/8`, or single address */
function listOf(networks: readonly string[]): BlockList {
  const list = new BlockList()
  for (const network of networks) {
    const [address = '', bits] = network.split('/')
    const most = { 0: -1, 4: 32, 6: 128 }[isIP(address)] ?? -1
    const prefix = bits === undefined ? most : bits === '' ? NaN : Number(bits)
    if (!(prefix >= 0 && prefix <= most && Number.isInteger(prefix)))
      throw new Error(
        `BRIDGE_PRIVATE_ADDRESSES has ${network}, which is neither a network, such as 10.1.0.0/16, nor an address.`,
      )
    list.addSubnet(address, prefix, familyOf(address))
  }
  return list
}

const specialV4 = listOf(SPECIAL_V4)
const globalV6 = listOf(GLOBAL_V6)
const specialV6 = listOf(SPECIAL_V6)

/** Where calls may go. */
export interface AddressRules {
  /** allowed: named by whoever runs this installation. Anything that is not an IP address is refused. */
  verdictOn(address: string): 'public' | 'allowed' | 'refused'
}

/**
 * @param allowed networks apart by commas that may be called although they are not public, `10.1.0.0/16, fd00::/8`
 * @throws Error naming what is no network
 */
export function addressRules(allowed: string): AddressRules {
  const networks = allowed.split(/[\s,]+/).filter((word) => word !== '')
  const named = listOf(networks)
  return {
    verdictOn(address) {
      if (isIP(address) === 0 || address.includes('%')) return 'refused'
      const family = familyOf(address)
      if (named.check(address, family)) return 'allowed'
      const isPublic =
        family === 'ipv4'
          ? !specialV4.check(address, family)
          : globalV6.check(address, family) && !specialV6.check(address, family)
      return isPublic ? 'public' : 'refused'
    },
  }
}
