import { describe, expect, it } from 'vitest'
import type { StructureView } from '../../../../shared/schemas/problems'
import type { MachinePrecision, StructureDetailsView } from '../../../../shared/schemas/structure'
import { THIN_SPACE } from '../../../../utils/format'
import { explain } from '../../../../utils/help/registry'
import { precisionSentence, structureLines, underHelp } from '../../../../utils/problem/structure-words'

const details: StructureDetailsView = {
  variables: 6,
  interactions: 5,
  treewidthLowerBound: 2,
  componentSizes: [
    { variables: 3, count: 1 },
    { variables: 1, count: 3 },
  ],
  distinct: { linear: 1, interactions: 2 },
  fields: { negative: 1, zero: 5, positive: 0 },
  couplings: { negative: 2, zero: 0, positive: 3 },
  balanced: false,
  triangles: { count: 4, frustrated: 1 },
  symmetries: { free: 2, mirrored: 1, interchangeable: { sets: 1, variables: 2, largest: 2 } },
  machines: [],
  fingerprint: '',
  seconds: 0,
  version: '',
}
const structure = { treewidthUpperBound: 4, components: 4, isolated: 3 } as StructureView
const machine: MachinePrecision = {
  machineId: 'm',
  machine: 'Alder',
  calibration: 3,
  sigmaH: 0.01,
  sigmaJ: 0.02,
  scale: 0.5,
  coefficients: 12,
  fieldsUnder: 2,
  interactionsUnder: 3,
}
const lineOf = (label: string, more: Partial<StructureDetailsView> = {}, upper: number | null = 4) =>
  structureLines({ ...details, ...more }, { ...structure, treewidthUpperBound: upper }).find(
    (line) => line.label === label,
  )

describe('the structure report in words', () => {
  it('gives the treewidth between its bounds, exactly where they meet, and from below where none was sought', () => {
    expect(lineOf('Treewidth')).toMatchObject({ value: '2 to 4' })
    expect(lineOf('Treewidth', {}, 2)).toMatchObject({ value: '2', note: expect.stringContaining('Both bounds meet') })
    expect(lineOf('Treewidth', {}, null)).toMatchObject({ value: '≥ 2', note: expect.stringContaining('too large') })
    expect(explain(lineOf('Treewidth')!.help!).result).toBe('≥ 2')
  })

  it('names components by size, largest first', () => {
    expect(lineOf('Components')).toMatchObject({
      value: '4',
      note: '1 of 3 variables, 3 of 1 variable. They can be solved apart.',
    })
  })

  it('says what is frustrated and what can be swapped', () => {
    expect(lineOf('Frustration')!.note).toContain(`Of 4 triangles, 1 (25${THIN_SPACE}%)`)
    expect(lineOf('Frustration', { balanced: true })!.value).toBe('none')
    expect(lineOf('Frustration', { couplings: { negative: 0, zero: 0, positive: 0 } })).toBeUndefined()
    expect(lineOf('Several optima')!.note).toMatch(/1 component .* 2 variables without .* 2 variables in 1 set/)
    const none = { free: 0, mirrored: 0, interchangeable: { sets: 0, variables: 0, largest: 0 } }
    expect(lineOf('Several optima', { symmetries: none })!.value).toBe('no sign')
  })

  it('says in a sentence what control error does on a machine, as its explanation counts it', () => {
    expect(precisionSentence(machine)).toBe(
      'Of 12 coefficients, 5 are smaller than 2σ once the largest fits the range of Alder: control error can turn their sign.',
    )
    expect(precisionSentence({ ...machine, fieldsUnder: 0, interactionsUnder: 1 })).toContain('1 is smaller')
    expect(precisionSentence({ ...machine, fieldsUnder: 0, interactionsUnder: 0 })).toContain('none is smaller')
    expect(precisionSentence({ ...machine, sigmaH: 0, sigmaJ: 0 })).toContain('states no control error')
    expect(explain(underHelp(machine)).result).toBe('5')
  })
})
