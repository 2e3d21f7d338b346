import { describe, expect, it } from 'vitest'
import { ByteSource } from '../../../../shared/engine/formats/byte-source'
import { ReadingFault, type ProblemDocument } from '../../../../shared/engine/formats/format'
import { npy } from '../../../../shared/engine/formats/npy'
import { readNpyHeader, writeNpyHeader } from '../../../../shared/engine/formats/npy-header'
import { elementReader, elementType } from '../../../../shared/engine/formats/npy-types'
import { createRandom } from '../../../../shared/engine/random'
import { randomProblem, real } from '../../../fixtures/problems/random-problem'

/** An array file with any head; its length is right unless another is given. */
function file(head: string, data: Uint8Array = new Uint8Array(0), version: [number, number] = [1, 0]): Uint8Array {
  const text = new TextEncoder().encode(head)
  const length = version[0] === 1 ? [text.length & 255, text.length >> 8] : [text.length & 255, text.length >> 8, 0, 0]
  return Uint8Array.of(0x93, ...new TextEncoder().encode('NUMPY'), ...version, ...length, ...text, ...data)
}

const headerOf = (bytes: Uint8Array) => readNpyHeader(new ByteSource([bytes]))
const faultOf = (bytes: Uint8Array): string => {
  try {
    npy.read([bytes], {})
  } catch (error) {
    if (error instanceof ReadingFault) return error.message
    throw error
  }
  return 'none'
}

describe('the head of an array file', () => {
  it('is read with other quotes, order of keys, spacing and commas', () => {
    const expected = { descr: '>i4', fortranOrder: true, shape: [3, 4] }
    for (const text of [
      `{'descr': '>i4', 'fortran_order': True, 'shape': (3, 4), }  \n`,
      `{"shape":(3,4),"fortran_order":True,"descr":">i4"}`,
      ` { 'fortran_order' : True , 'shape' : ( 3L , 4L ) , 'descr' : '>i4' } `,
    ])
      expect(headerOf(file(text))).toEqual(expected)
    expect(headerOf(file(`{'descr': '|b1', 'fortran_order': False, 'shape': ()}`)).shape).toEqual([])
    expect(headerOf(file(`{'descr': '|b1', 'fortran_order': False, 'shape': (7,)}`, undefined, [2, 0])).shape).toEqual([
      7,
    ])
  })

  it.each([
    ['', 'does not state'],
    ['{}', 'does not state'],
    [`{'descr': '<f8', 'fortran_order': False}`, 'does not state'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (2, 2), 'more': True}`, 'does not state'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (2, 2)} or 1`, 'does not state'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (2, 2) 'descr': '<f8'}`, 'does not state'],
    [`{'descr': '<f8', 'descr': '<f8', 'fortran_order': False, 'shape': (2, 2)}`, 'does not state'],
    [`{'descr': '<f8', 'fortran_order': 0, 'shape': (2, 2)}`, 'does not state'],
    [`{'descr': __import__('os'), 'fortran_order': False, 'shape': (2, 2)}`, 'does not state'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (2 2)}`, 'no valid shape'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (,)}`, 'no valid shape'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (99999999999999999, 2)}`, 'no valid shape'],
    [`{'descr': [('a', '<f8')], 'fortran_order': False, 'shape': (2, 2)}`, 'structured type'],
    [`{'descr': '<q8', 'fortran_order': False, 'shape': (2, 2)}`, 'a size that is not known'],
    [`{'descr': '=f8', 'fortran_order': False, 'shape': (2, 2)}`, 'order of bytes open'],
    [`{'descr': '|f8', 'fortran_order': False, 'shape': (2, 2)}`, 'order of bytes open'],
    [`{'descr': 'float64', 'fortran_order': False, 'shape': (2, 2)}`, 'which is not known'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (5001, 5001)}`, 'at most 5000 variables, not 5001'],
    [`{'descr': '<f8', 'fortran_order': False, 'shape': (2, 2)}`, 'cut short'],
  ])('%s is refused', (text, reason) => {
    expect(faultOf(file(text))).toContain(reason)
  })

  it('of other versions, too long, or cut short is refused', () => {
    const text = `{'descr': '<f8', 'fortran_order': False, 'shape': (1, 1), }`
    expect(faultOf(file(text, undefined, [4, 0]))).toContain('version 4.0')
    expect(faultOf(file(text, undefined, [1, 1]))).toContain('version 1.1')
    const long = file(text, undefined, [2, 0])
    long[10] = 1
    expect(faultOf(long)).toBe('the head of the NumPy file is longer than 65536 bytes')
    const whole = file(text, new Uint8Array(8))
    for (let length = 0; length < whole.length; length++)
      expect(faultOf(whole.subarray(0, length)), `${length}`).toContain('cut short')
    expect(faultOf(whole)).toBe('none')
    expect(faultOf(Uint8Array.of(...whole, 0))).toContain('more bytes follow')
  })

  it('is written padded to a multiple of 64 bytes, and read back', () => {
    for (const shape of [[], [5], [5, 5], [123_456_789, 123_456_789, 123_456_789, 123_456_789, 123_456_789]]) {
      const head = writeNpyHeader('<f8', shape)
      expect(head.length % 64).toBe(0)
      expect(headerOf(head)).toEqual({ descr: '<f8', fortranOrder: false, shape })
    }
  })
})

describe('half precision', () => {
  it('agrees with the definition for every pattern of bits', () => {
    const view = new DataView(new ArrayBuffer(2))
    const read = elementReader(elementType('<f2'))
    const wrong: number[] = []
    for (let bits = 0; bits < 65_536; bits++) {
      view.setUint16(0, bits, true)
      const [exponent, fraction] = [(bits >> 10) & 31, (bits & 1023) / 1024]
      const size = exponent === 0 ? fraction * 2 ** -14 : (1 + fraction) * 2 ** (exponent - 15)
      const found = read(view, 0)
      const value = exponent < 31 ? size : fraction === 0 ? Infinity : NaN
      if (!Object.is(found, bits < 32_768 || Number.isNaN(value) ? value : -value)) wrong.push(bits)
    }
    expect(wrong).toEqual([])
  })
})

describe('writing an array', () => {
  const labels = ['0', '1', '2']
  const problem = { ...randomProblem(createRandom(3), 3, 1, real), offset: 0 }
  const document: ProblemDocument = { form: 'qubo', labels, problem, sense: 'min' }

  it('reads back to the same problem', () => {
    const reading = npy.read([npy.write(document)], {})
    expect(reading).toMatchObject({ labels, problem, triangle: 'upper', duplicatesSummed: 0 })
  })

  it('is refused where something would be lost, and says what', () => {
    expect(() => npy.write({ ...document, form: 'ising' })).toThrow('would lose the Ising form: take .npz')
    expect(() => npy.write({ ...document, sense: 'max' })).toThrow('that it is maximised')
    expect(() => npy.write({ ...document, problem: { ...problem, offset: 1.5 } })).toThrow('the offset 1.5')
    expect(() => npy.write({ ...document, labels: ['1', '2', '3'] })).toThrow('the labels')
  })
})

describe('booleans', () => {
  it('are the bytes 0 and 1 and no other', () => {
    const text = `{'descr': '|b1', 'fortran_order': False, 'shape': (2, 2), }`
    expect(npy.read([file(text, Uint8Array.of(1, 0, 1, 1))], {}).problem).toMatchObject({
      linear: Float64Array.of(1, 1),
      values: Float64Array.of(1),
    })
    expect(faultOf(file(text, Uint8Array.of(1, 0, 2, 1)))).toBe('element [1, 0]: the byte 2 is neither False nor True')
  })
})
