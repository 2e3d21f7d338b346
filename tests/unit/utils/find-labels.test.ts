import { describe, expect, it } from 'vitest'
import { labelsHolding } from '../../../utils/find-labels'

describe('labelsHolding', () => {
  const labels = ['b10', 'ab1', 'b2', 'B1', 'c']
  const found = (words: string, most?: number) => labelsHolding(labels, words, most).map((i) => labels[i])

  it('puts the one meant first, then beginnings, then the rest, by number', () =>
    expect(found(' b1 ')).toEqual(['B1', 'b10', 'ab1']))
  it('orders numbers by value', () => expect(found('b')).toEqual(['B1', 'b2', 'b10', 'ab1']))
  it('gives no more than asked', () => expect(found('b', 2)).toEqual(['B1', 'b2']))
  it('finds nothing for no words', () => expect(found('  ')).toEqual([]))
})
