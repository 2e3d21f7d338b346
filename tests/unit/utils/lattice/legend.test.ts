import { describe, expect, it } from 'vitest'
import { kindCounts, legendEntries } from '../../../../utils/lattice/legend'

const plain = { lens: null, oneRead: false, hasFocus: false, missing: false, missingCouplers: false, marks: null }

describe('legendEntries', () => {
  it('lists what is drawn and no more', () => {
    expect(legendEntries(plain).map(({ words }) => words)).toEqual(['qubit'])
    const words = legendEntries({ ...plain, lens: 'occupancy', hasFocus: true, missing: true }).map((e) => e.words)
    expect(words).toEqual(['chain', 'coupler carrying an interaction', 'labels', 'free qubit', 'missing qubit'])
  })

  it('lets everything be hidden that is a thing and not an explanation', () => {
    const pointedOut = { marks: 'lost since', regained: 'back since' }
    const entries = legendEntries({ ...plain, lens: 'breaks', missingCouplers: true, ...pointedOut })
    expect(entries.map(({ sign, kind }) => [sign, kind])).toEqual([
      ['broken', 'breaks'],
      ['held', undefined],
      ['label', 'labels'],
      ['free', 'free'],
      ['missing-coupler', 'missingCouplers'],
      ['marked', 'marks'],
      ['regained', 'regained'],
    ])
    const signs = legendEntries({ ...plain, lens: 'breaks', oneRead: true }).map(({ sign }) => sign)
    expect(signs.slice(0, 3)).toEqual(['up', 'down', 'broken'])
  })
})

describe('kindCounts', () => {
  it('counts a qubit that two chains want once', () => {
    const data = { usable: Uint8Array.of(1, 1, 0, 1, 1), missingCouplers: Uint32Array.of(0, 1) }
    expect(kindCounts(data, { qubits: Uint32Array.of(0, 1, 1) }, null)).toEqual({
      free: 2,
      missing: 1,
      missingCouplers: 1,
      marks: 0,
      regained: 0,
    })
    const marks = {
      qubits: Uint32Array.of(0),
      words: '',
      couplers: Uint32Array.of(0, 1, 1, 2),
      regained: { qubits: Uint32Array.of(3, 4), couplers: new Uint32Array(0), words: '' },
    }
    expect(kindCounts(data, null, marks)).toMatchObject({ marks: 3, regained: 2 })
    expect(kindCounts({ usable: Uint8Array.of(1) }, null, { qubits: Uint32Array.of(0), words: '' }).free).toBe(1)
  })
})
