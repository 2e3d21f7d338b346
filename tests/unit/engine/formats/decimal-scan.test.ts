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

  it.each(['', '-', '.', '+.', 'e5', '1e', '1e+', '1e999', 'x', '1234567890', '0.1234567890', '123456789.1234567'])(
    'leaves %j to the general way',
    (text) => expect(read(text)[0]).toBe(-1),
  )

  it('knows no −0, and stops behind the number', () => {
    expect(Object.is(read('-0.00')[1], 0)).toBe(true)
    expect(read('12.5abc')).toEqual([4, 12.5])
  })
})
