import { describe, expect, it } from 'vitest'
import type { ReturnView } from '../../../../shared/schemas/returns'
import { returnWire } from '../../../../utils/run-sheet/wire'

const chain = (length: number, strength: number) => ({ length, strength })

function strengthNote(chains: { length: number; strength: number }[]): string | undefined {
  const samples = {
    problem: { id: 'p', variables: chains.length },
    embedding: { id: 'e', number: 1 },
    runSheet: { id: 'r', number: 2, state: 'returned' },
    source: 'upload',
    status: 'ready',
    reads: 100,
    breaks: { chains },
  } as unknown as ReturnView
  return returnWire(samples).find(({ label }) => label === 'Strength')?.note
}

describe('returnWire', () => {
  it('gives the range of k over the chains that have couplers to hold them', () => {
    expect(strengthNote([chain(1, 0), chain(2, 0.75), chain(4, 9.5)])).toBe('k = 0.75 to 9.5')
  })

  it('gives no k when every chain is a single qubit', () => {
    expect(strengthNote([chain(1, 0), chain(1, 0)])).toBeUndefined()
  })
})
