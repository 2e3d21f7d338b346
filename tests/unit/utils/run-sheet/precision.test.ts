import { describe, expect, it } from 'vitest'
import { packArrays, unpackArrays } from '../../../../shared/packed-arrays'
import { unpackChainRows } from '../../../../utils/run-sheet/chains'
import { partsText, valueChart } from '../../../../utils/run-sheet/precision'
import { shareText, smallestText } from '../../../../utils/run-sheet/strength'

describe('valueChart', () => {
  it('has a bar for each bin with values, those within ±2σ apart, and the range and σ marked', () => {
    const { points, width, rules, spans, min, max } = valueChart({
      range: [-2, 1],
      sigma: 0.5,
      counts: [4, 0, 1, 2, 3, 5],
    })
    expect(width).toBe(0.5)
    expect(points).toEqual([
      { x: -1.75, y: 4 },
      { x: -0.75, y: 1, tone: 'ochre' },
      { x: -0.25, y: 2, tone: 'ochre' },
      { x: 0.25, y: 3, tone: 'ochre' },
      { x: 0.75, y: 5, tone: 'ochre' },
    ])
    expect(rules.map(({ at, label }) => [at, label])).toEqual([
      [-2, '−2'],
      [1, '1'],
      [-0.5, undefined],
      [0.5, undefined],
    ])
    expect(spans).toEqual([{ from: -1, to: 1, tone: 'tint' }])
    expect(min).toBeLessThan(-2)
    expect(max).toBeGreaterThan(1)
  })

  it('marks the range alone where the machine states no control error', () => {
    const { rules, spans, points } = valueChart({ range: [-1, 1], sigma: 0, counts: [1, 1] })
    expect(rules).toHaveLength(2)
    expect(spans).toEqual([])
    expect(points.every(({ tone }) => tone === undefined)).toBe(true)
  })
})

it('says which coefficient is the smallest and what share drowns', () => {
  expect(smallestText({ smallest: { kind: 'field', value: -3, sigma: 0.02 }, scale: 0.01 })).toBe('h, 1.5')
  expect(smallestText({ smallest: null, scale: 1 })).toBe('–')
  expect(shareText({ under: 0, of: 0 })).toBe('–')
  expect(partsText({ of: ['a'], parts: 1 })).toBe('1 qubit')
  expect(partsText({ of: ['a', 'b'], parts: 3 })).toBe('3 couplers')
})

it('unpacks chains as they were packed; one qubit has no split', () => {
  const bytes = packArrays(
    {
      qubits: Uint32Array.of(2, 1),
      couplers: Uint32Array.of(5, 3),
      strength: Float64Array.of(1.5, 0),
      cutBound: Float64Array.of(2, 0),
      exact: Uint8Array.of(0, 1),
      splits: Float64Array.of(4, 6, 2, 0, 0, 1),
      pull: Float64Array.of(7, 8),
      field: Float64Array.of(-1, 0),
    },
    { labels: ['a', 'b'] },
  )
  const [a, b] = unpackChainRows(unpackArrays(bytes))
  expect(a).toEqual({
    variable: 0,
    label: 'a',
    qubits: 2,
    couplers: 5,
    strength: 1.5,
    cutBound: 2,
    cutBoundExact: false,
    cutSplit: { up: 4, down: 6, cut: 2 },
    pull: 7,
    field: -1,
  })
  expect(b).toMatchObject({ label: 'b', cutSplit: null, cutBoundExact: true })
})
