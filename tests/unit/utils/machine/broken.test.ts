import { describe, expect, it } from 'vitest'
import type { BrokenView, RepairView } from '../../../../shared/schemas/repairs'
import { THIN_SPACE } from '../../../../utils/format'
import { brokenState, damagedChains, missingNames, missingParts, untouched } from '../../../../utils/machine/broken'

const damage = { chains: 2, ofChains: 40, qubitsLost: [17, 42, 8], couplersLost: [[5, 6]] as [number, number][] }
const repair = (change: Partial<RepairView>): RepairView => ({
  id: 'r',
  number: 7,
  calibration: 3,
  status: 'found',
  jobId: 'j',
  progress: null,
  message: '',
  changedChains: 2,
  ...change,
})
const broken = (change: Partial<BrokenView>): BrokenView => ({
  embedding: { id: 'e', number: 1 },
  machine: { id: 'm', name: 'Alder' },
  problem: { id: 'p', number: 1, name: 'Berths' },
  createdBy: { id: 'u', name: 'Ida' },
  calibration: 3,
  calibrationInForce: 3,
  damage,
  runSheets: [],
  state: 'to repair',
  holdsAgain: null,
  repair: null,
  ...change,
})

describe('what a calibration broke', () => {
  it('is told in numbers and names', () => {
    expect(damagedChains(damage)).toBe('2 of 40 chains')
    expect(missingParts(damage)).toBe('3 qubits, 1 coupler')
    expect(missingNames(damage)).toBe('17, 42, 8, 5–6')
    expect(missingParts({ ...damage, couplersLost: [], qubitsLost: [1] })).toBe('1 qubit')
    const many = Array.from({ length: 15 }, (_, q) => q)
    expect(missingNames({ ...damage, couplersLost: [], qubitsLost: many })).toBe(
      '0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11 and 3 more',
    )
  })

  it('says how much a repair left alone', () => {
    expect(untouched(2, 40)).toBe(`38 of 40 chains untouched (95${THIN_SPACE}%)`)
    expect(untouched(0, 1)).toBe(`1 of 1 chain untouched (100${THIN_SPACE}%)`)
    expect(untouched(0, 0)).toBe('0 of no chains untouched')
  })

  it('stands in one of four ways', () => {
    expect(brokenState(broken({}))).toEqual({ mark: 'caution', words: 'to repair', more: '' })
    expect(brokenState(broken({ repair: repair({ status: 'none found' }) })).more).toBe('the last repair found none:')
    expect(brokenState(broken({ state: 'running', repair: repair({ status: 'running', progress: 0.4 }) }))).toEqual({
      mark: 'computed',
      words: 'repair running:',
      more: `40${THIN_SPACE}%`,
    })
    expect(brokenState(broken({ state: 'repaired', repair: repair({}) })).more).toBe(
      `38 of 40 chains untouched (95${THIN_SPACE}%)`,
    )
    expect(brokenState(broken({ state: 'holds again', holdsAgain: 4 })).words).toBe('holds again at calibration 4')
  })
})
