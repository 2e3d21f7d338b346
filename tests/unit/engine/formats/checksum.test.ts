import { describe, expect, it } from 'vitest'
import { crc32 } from '../../../../shared/engine/formats/checksum'

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)

describe('crc32', () => {
  it('has the check value of the published polynomial', () => {
    expect(crc32(bytes('123456789'))).toBe(0xcbf43926)
    expect(crc32(new Uint8Array(0))).toBe(0)
  })

  it('goes on from the checksum of earlier bytes', () => {
    const whole = bytes('Nevern, Farstrand and Skerry Sound')
    for (let cut = 0; cut <= whole.length; cut++)
      expect(crc32(whole.subarray(cut), crc32(whole.subarray(0, cut)))).toBe(crc32(whole))
  })

  it('is the remainder of bit by bit division, whatever the length', () => {
    const divided = (contents: Uint8Array): number => {
      let rest = 0xffffffff
      for (const byte of contents)
        for (let bit = 0; bit < 8; bit++) {
          const isOdd = ((rest ^ (byte >>> bit)) & 1) === 1
          rest = (rest >>> 1) ^ (isOdd ? 0xedb88320 : 0)
        }
      return ~rest >>> 0
    }
    for (let length = 0; length < 70; length++) {
      const contents = Uint8Array.from({ length }, (_, k) => (k * 151 + length * 89) & 0xff)
      expect(crc32(contents)).toBe(divided(contents))
    }
  })
})
