import { expect, test } from 'vitest'
import { shareArrays } from '../../../../server/workers/shared-arrays'

test('arrays of every kind are copied into memory that threads share, all else is kept', () => {
  const value = {
    a: Uint8Array.of(1, 2, 3),
    b: { c: Float32Array.of(0.5), d: [Uint32Array.of(7), 'x'] },
    e: Float64Array.from({ length: 10 }, (_, i) => i).subarray(4, 6),
    none: null,
    text: 'y',
    number: 4,
  }
  const shared = shareArrays(value)
  expect(shared).toEqual(value)
  for (const array of [shared.a, shared.b.c, shared.b.d[0] as Uint32Array, shared.e])
    expect(array.buffer).toBeInstanceOf(SharedArrayBuffer)
  expect(shared.e.buffer.byteLength).toBe(16)
})
