import { describe, expect, it } from 'vitest'
import type { UploadedGraph } from '../../../../shared/schemas/machine-uploads'
import { explain } from '../../../../utils/help/registry'
import { familyTitle, newMachineFacts } from '../../../../utils/machine/facts'
import { uploadedRows } from '../../../../utils/machine/uploaded-graph'

const GRAPH: UploadedGraph = {
  graph: 'graph of 5 qubits',
  format: 'edge-list',
  formatSource: 'detected',
  positions: 'drawn',
  fingerprint: '',
  qubits: 5,
  couplers: 3,
  leastDegree: 0,
  mostDegree: 2,
  parts: 2,
  isolatedQubits: 1,
  lowestNumber: 3,
  highestNumber: 9,
}

describe('uploadedRows', () => {
  it('tells what a person checks a graph by', () => {
    expect(uploadedRows(GRAPH).map(({ what, value, note }) => `${what}: ${value}, ${note}`)).toEqual([
      'Qubits: 5, numbers 3 to 9, 2 of them not used',
      'Couplers: 3, each counted once',
      'Couplers a qubit: 0 to 2, 1 without any',
      'Connected parts: 2, an embedding’s component stays within one part',
      'Positions: drawn, none in the file: drawn from the couplers alone',
    ])
  })

  it('says so where nothing is amiss', () => {
    const whole = { ...GRAPH, leastDegree: 4, mostDegree: 4, parts: 1, isolatedQubits: 0, highestNumber: 7 }
    const rows = uploadedRows({ ...whole, positions: 'given' })
    expect(rows.map(({ note }) => note)).toEqual([
      'numbers 3 to 7',
      'each counted once',
      'none without any',
      'all qubits hang together',
      'taken from the file',
    ])
    expect(rows[2]!.value).toBe('4')
  })
})

describe('facts of a graph of no family', () => {
  const custom = { kind: 'custom', qubits: 5, couplers: 3, fingerprint: '', positions: 'drawn' } as const

  it('name the file, shortened but for its ending', () => {
    expect(familyTitle({ ...custom, file: 'lab.csv' })).toBe('from lab.csv')
    expect(familyTitle({ ...custom, file: 'a-very-long-name-of-a-machine-graph.graphml' })).toBe(
      'from a-very-long-n…ph.graphml',
    )
  })

  it('count what the file holds', () => {
    const family = { ...custom, file: 'lab.csv' }
    expect(explain({ id: 'qubitsMade', given: { family } }).result).toBe('5')
    expect(explain({ id: 'workingQubits', given: { family, missing: 2 } }).result).toBe('3')
    expect(explain({ id: 'couplersMade', given: { family, couplers: 3 } })).toMatchObject({
      result: '3',
      method: 'Counted in the uploaded graph: pairs of qubits that it joins.',
    })
  })

  it('are told of a new machine without formulas', () => {
    const facts = newMachineFacts({ name: 'graph of 5 qubits', qubits: 5, couplers: 3, family: null }, '3, 4-5')
    expect(facts.map(({ value }) => value)).toEqual(['graph of 5 qubits', '5', '3', '1', '1'])
    expect(facts.every(({ help }) => help === undefined)).toBe(true)
    expect(newMachineFacts(null, '').map(({ value }) => value)).toEqual(['–', '–', '–', '0', '0'])
  })
})
