import { describe, expect, it } from 'vitest'
import type { ReferenceOfSamples } from '../../../../shared/schemas/reference'
import type { ReturnView } from '../../../../shared/schemas/returns'
import { wilson } from '../../../../shared/engine/readout/intervals'
import { explain } from '../../../../utils/help/registry'
import { referenceFacts, referenceVerdict } from '../../../../utils/returns/reference'

const { low, high } = wilson(3, 40)
const reference = (change: Partial<ReferenceOfSamples> = {}): ReferenceOfSamples => ({
  energy: -20,
  proved: true,
  method: 'enumeration',
  gap: 2,
  success: { count: 3, total: 40, rate: 3 / 40, low, high },
  ...change,
})
const samples = (known: ReferenceOfSamples | null, best = -18, sense: 'min' | 'max' = 'min') =>
  ({ reference: known, energies: { best }, problem: { sense }, source: 'upload' }) as ReturnView

describe('samples against the reference optimum', () => {
  it('read as their explanations do', () => {
    const facts = referenceFacts(samples(reference()))
    expect(facts.map(({ label }) => label)).toEqual([
      'Reference optimum',
      'Best read is worse by',
      'Success probability',
    ])
    for (const { help, value } of facts) if (help) expect(explain(help).result).toBe(value)
    const greatest = referenceFacts(samples(reference({ energy: 20 }), 18, 'max'))
    expect(explain(greatest[1]!.help!).result).toBe('2')
  })

  it.each([
    [null, /Nobody has looked/],
    [reference({ gap: null }), /No read is left/],
    [reference({ gap: 0 }), /No better assignment/],
    [reference(), /what these samples miss/],
    [reference({ gap: 0, proved: false }), /not proved/],
    [reference({ gap: 1, proved: false }), /may be larger/],
    [reference({ gap: -3, proved: false }), /better by 3/],
  ])('say what they come to: %#', (known, words) => {
    expect(referenceVerdict(samples(known)).text).toMatch(words)
  })
})
