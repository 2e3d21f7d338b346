import { describe, expect, it } from 'vitest'
import { DecimalScan } from '../../../../shared/engine/formats/decimal-scan'
import { createRandom } from '../../../../shared/engine/random'

const scan = new DecimalScan()
const read = (text: string): [number, number] => {
  const end = scan.scan(new TextEncoder().encode(`${text}\n`), 0)
  return [end, scan.value]
}

describe('DecimalScan', () => {
  it('agrees with the general way to the last bit, wherever it takes a number at all', () => {
    const random = createRandom(81)
    const digits = (most: number): string =>
      Array.from({ length: random.below(most + 1) }, () => String(random.below(10))).join('')
    let taken = 0
    const wrong: string[] = []
    for (let trial = 0; trial < 30_000; trial++) {
      const exponent = random.below(3) === 0 ? `e${['', '+', '-'][random.below(3)]}${random.below(27)}` : ''
      const text = `${['', '-', '+'][random.below(3)]}${digits(10)}${random.below(3) ? `.${digits(10)}` : ''}${exponent}`
      const [end, value] = read(text)
      if (end < 0) continue
      taken++
      if (end !== text.length || !Object.is(value, Number(text) + 0)) wrong.push(text)
    }
    expect(wrong).toEqual([])
    expect(taken).toBeGreaterThan(15_000)
  })

  it('agrees on doubles written in full, and on more digits than they have', () => {
    const random = createRandom(82)
    let taken = 0
    const wrong: string[] = []
    for (let trial = 0; trial < 30_000; trial++) {
      const value = random.normal() * 10 ** (random.below(12) - 8)
      const text = [String(value), value.toPrecision(16 + random.below(6)), value.toExponential(18)][random.below(3)]!
      const [end, scanned] = read(text)
      if (end < 0) continue
      taken++
      if (end !== text.length || scanned !== Number(text)) wrong.push(text)
    }
    expect(wrong).toEqual([])
    expect(taken).toBeGreaterThan(15_000)
  })

  it('agrees, or leaves it, where a number lies near the middle between two doubles', () => {
    const random = createRandom(83)
    const wrong: string[] = []
    for (let trial = 0; trial < 5000; trial++) {
      // Odd multiples of half a unit in the last place of doubles from 2⁵² on, and their neighbours a ninth digit away.
      const middle = BigInt(2 ** 52 + random.below(2 ** 31)) * 2n + 1n
      const text = `${middle / 2n}.${['5', '49', '51', '50'][random.below(4)]}`
      const [end, value] = read(text)
      if (end >= 0 && value !== Number(text)) wrong.push(text)
    }
    expect(wrong).toEqual([])
  })

  it.each(['', '-', '.', '+.', 'e5', '1e', '1e+', '1e999', 'x', '1e23', '12345678901234567890', '1234567890123456e1'])(
    'leaves %j to the general way',
    (text) => expect(read(text)[0]).toBe(-1),
  )

  it('knows no −0, and stops behind the number', () => {
    expect(Object.is(read('-0.00')[1], 0)).toBe(true)
    expect(read('12.5abc')).toEqual([4, 12.5])
  })
})
