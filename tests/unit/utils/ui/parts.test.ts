import { describe, expect, it } from 'vitest'
import { isRunState, nextSort, parseTyped } from '../../../../utils/ui/parts'

describe('parseTyped', () => {
  it('reads what people type', () => {
    expect(parseTyped('1 000')).toBe(1000)
    expect(parseTyped('4\u202f313')).toBe(4313)
    expect(parseTyped('\u22120.5')).toBe(-0.5)
    expect(parseTyped('.5')).toBe(0.5)
    expect(parseTyped('2.')).toBe(2)
    expect(parseTyped('1e-3')).toBe(0.001)
  })

  it('tells empty from unreadable', () => {
    expect(parseTyped('  ')).toBeNull()
    for (const text of ['6,5', 'abc', '1.2.3', '-', '0x10', 'Infinity']) expect(parseTyped(text)).toBeNaN()
  })
})

describe('nextSort', () => {
  it('starts in the first direction and then turns', () => {
    const first = nextSort(undefined, 'breaks', 'descending')
    expect(first).toEqual({ field: 'breaks', direction: 'descending' })
    const second = nextSort(first, 'breaks', 'descending')
    expect(second.direction).toBe('ascending')
    expect(nextSort(second, 'name', 'ascending')).toEqual({ field: 'name', direction: 'ascending' })
  })
})

it('tells run states from marks', () => {
  expect(isRunState('sent back')).toBe(true)
  expect(isRunState('caution')).toBe(false)
})
