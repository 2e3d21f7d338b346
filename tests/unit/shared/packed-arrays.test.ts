import { describe, expect, it } from 'vitest'
import { packArrays, unpackArrays } from '../../../shared/packed-arrays'

const arrays = {
  doubles: Float64Array.of(0.1, -0, Infinity, 2 ** -1074),
  bytes: Uint8Array.of(1, 2, 255),
  words: Uint32Array.of(4294967295),
  small: Int8Array.of(-1, 1, -128),
  none: new Float32Array(),
}

describe('packed arrays', () => {
  it('come back to the last bit, with the JSON that travelled along', () => {
    const { meta, arrays: back } = unpackArrays(packArrays(arrays, { labels: ['ä', 'b'], n: 2 }))
    expect(meta).toEqual({ labels: ['ä', 'b'], n: 2 })
    expect(Object.keys(back)).toEqual(Object.keys(arrays))
    for (const [name, array] of Object.entries(arrays)) {
      expect(back[name]!.constructor).toBe(array.constructor)
      expect(Array.from(back[name]!, (v) => (Object.is(v, -0) ? '-0' : v))).toEqual(
        Array.from(array, (v) => (Object.is(v, -0) ? '-0' : v)),
      )
    }
  })

  it('can be read out of the middle of another buffer', () => {
    const packed = packArrays(arrays)
    const around = new Uint8Array(packed.length + 20)
    around.set(packed, 3)
    expect(unpackArrays(around.subarray(3, 3 + packed.length)).arrays.doubles).toEqual(arrays.doubles)
  })

  it('are refused when cut short', () => {
    const packed = packArrays(arrays)
    expect(() => unpackArrays(packed.subarray(0, packed.length - 40))).toThrow(RangeError)
  })
})
