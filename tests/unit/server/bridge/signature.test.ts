import { createHmac } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { signatureHeaders, validKeys, withNewKey } from '../../../../server/bridge/signature'

const NOW = new Date('2026-12-02T12:00:00.900Z')
const later = (hours: number): Date => new Date(NOW.getTime() + hours * 3_600_000)
const KEY = { id: '0a1b2c3d', secret: 'espalier_bridge_example', madeAt: NOW.toISOString(), endsAt: null }

describe('the signature of a call', () => {
  it('is the one worked out in the docs', () => {
    expect(signatureHeaders([KEY], NOW, '{"event":"test"}')).toEqual({
      'espalier-timestamp': '1796212800',
      'espalier-signature': '0a1b2c3d=ea2f16237443d9e86f1e5bc6c596109f210f7fc91ed45a84bce58507d4e4a2bc',
    })
  })

  it('covers time and body', () => {
    const expected = createHmac('sha256', KEY.secret).update('1796212800.{}').digest('hex')
    expect(signatureHeaders([KEY], NOW, '{}')['espalier-signature']).toBe(`0a1b2c3d=${expected}`)
    expect(signatureHeaders([KEY], NOW, '{ }')['espalier-signature']).not.toContain(expected)
    expect(signatureHeaders([KEY], later(1), '{}')['espalier-signature']).not.toContain(expected)
  })

  it('is given with the secret before the newest as well, for a day', () => {
    const [newest, before] = withNewKey([KEY], NOW)
    expect(before).toEqual({ ...KEY, endsAt: later(24).toISOString() })
    expect(newest!.secret).toMatch(/^espalier_bridge_[\w-]{43}$/)
    const ids = (now: Date): string[] => {
      const { 'espalier-signature': signatures } = signatureHeaders([newest!, before!], now, '{}')
      return signatures!.split(', ').map((part) => part.split('=')[0]!)
    }
    expect(ids(later(23))).toEqual([newest!.id, KEY.id])
    expect(ids(later(24))).toEqual([newest!.id])
    expect(validKeys([newest!, before!], later(25))).toEqual([newest])
    expect(withNewKey([newest!, before!], NOW)).toHaveLength(2)
  })
})
