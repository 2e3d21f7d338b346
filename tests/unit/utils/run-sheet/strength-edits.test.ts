import { describe, expect, it } from 'vitest'
import type { ChainRow, RuleView } from '../../../../shared/schemas/run-sheets'
import type { StrengthDraft } from '../../../../utils/run-sheet/draft'
import { chainLines, filteredLines, linesCsv, sortedLines } from '../../../../utils/run-sheet/chain-ledger'
import { draftedStrength, editStrengths } from '../../../../utils/run-sheet/strength-edits'

const chain = (variable: number, part: Partial<ChainRow>): ChainRow => ({
  variable,
  label: `v${variable}`,
  qubits: 3,
  couplers: 4,
  strength: 2,
  cutBound: 1,
  cutBoundExact: true,
  cutSplit: null,
  pull: 6,
  field: 0,
  ...part,
})
const chains = [
  chain(0, { strength: 4, cutBound: 3 }),
  chain(1, { strength: 2, cutBound: 5, field: -1 }),
  chain(2, { strength: 4, qubits: 1, cutBound: 0 }),
  chain(3, { strength: 4, cutBound: 0, pull: 0, label: 'constructor' }),
]
const ground = { maxAbsJ: 8, leastShare: 0.05 }
const byCut: StrengthDraft = { rule: 'cut', value: 1.2, perChain: {} }
const shared: StrengthDraft = { rule: 'manual', value: 4, perChain: { v1: 2 } }
const edit = (draft: StrengthDraft, chosen: number[], what: Parameters<typeof editStrengths>[3]) =>
  editStrengths(draft, chains, new Set(chosen), what, ground)
const rule = (part: Partial<RuleView>) => part as RuleView

describe('editStrengths', () => {
  it('leaves every other chain as it was, whatever rule was in force', () => {
    const after = edit(byCut, [1], { to: 'value', k: 9 })
    expect(after).toEqual({ rule: 'manual', value: 4, perChain: { v1: 9 } })
    const strengths = chains.map((one) => draftedStrength(one, after))
    expect(strengths).toEqual([4, 9, 4, 4])
  })

  it('multiplies, sets to a margin over the bound, and goes back to a rule, chain by chain', () => {
    expect(edit(shared, [0, 1], { to: 'multiple', factor: 1.5 }).perChain).toEqual({ v0: 6, v1: 3 })
    // A chain that needs nothing is held by 5 % of the largest |J|.
    expect(edit(shared, [0, 1, 3], { to: 'bound', margin: 2 }).perChain).toEqual({ v0: 6, v1: 10, constructor: 0.4 })
    const choi = rule({ rule: 'choi', value: 1.5 })
    expect(edit(shared, [0, 1, 3], { to: 'rule', rule: choi }).perChain).toEqual({ v0: 9, v1: 7.5, constructor: 0.4 })
    const rms = rule({ rule: 'rms', value: 1, k: { min: 7, max: 7 } })
    expect(edit(shared, [1], { to: 'rule', rule: rms }).perChain).toEqual({ v1: 7 })
  })

  it('takes the name off chains that share the common strength again', () => {
    expect(edit(shared, [1], { to: 'shared' }).perChain).toEqual({})
    expect(edit(shared, [1], { to: 'value', k: 4 }).perChain).toEqual({})
  })

  it('leaves chains of one qubit alone, and multiplies nothing that is not typed yet', () => {
    expect(edit(shared, [2], { to: 'value', k: 9 })).toEqual(shared)
    const untyped: StrengthDraft = { rule: 'manual', value: null, perChain: {} }
    expect(edit(untyped, [0], { to: 'multiple', factor: 2 })).toEqual(untyped)
  })

  it('takes no name of a thing that every object has for a strength', () => {
    expect(draftedStrength(chains[3]!, shared)).toBe(4)
  })
})

describe('the table of chains', () => {
  const lines = chainLines(chains, shared)

  it('shows the drafted strength beside its bound; without coupler or bound there is no ratio', () => {
    expect(lines.map(({ strength, ratio, isOwn }) => [strength, ratio, isOwn])).toEqual([
      [4, 4 / 3, false],
      [2, 0.4, true],
      [4, Infinity, false],
      [4, Infinity, false],
    ])
  })

  it('sorts, equal ones as the problem has them', () => {
    const variables = (field: string, direction: 'ascending' | 'descending') =>
      sortedLines(lines, { field, direction }).map(({ variable }) => variable)
    expect(variables('ratio', 'ascending')).toEqual([1, 0, 2, 3])
    expect(variables('strength', 'descending')).toEqual([0, 2, 3, 1])
  })

  it('filters by label and by condition', () => {
    const labels = (...given: [string, Parameters<typeof filteredLines>[2], number[]]) =>
      filteredLines(lines, given[0], given[1], new Set(given[2])).map(({ label }) => label)
    expect(labels('V', 'all', [])).toEqual(['v0', 'v1', 'v2'])
    expect(labels('', 'below', [])).toEqual(['v1'])
    expect(labels('', 'own', [])).toEqual(['v1'])
    expect(labels('', 'selected', [3])).toEqual(['constructor'])
  })

  it('is a file with commas in labels quoted', () => {
    const [line] = chainLines([chain(0, { label: 'a,"b"' })], shared)
    expect(linesCsv([line!, lines[2]!])).toBe(
      'variable,qubits,couplers to others,k,cut bound,bound exact\n"a,""b""",3,4,4,1,true\nv2,1,4,,,\n',
    )
  })
})
