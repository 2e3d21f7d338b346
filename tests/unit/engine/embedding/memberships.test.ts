import { describe, expect, it } from 'vitest'
import { Memberships } from '../../../../shared/engine/embedding/memberships'
import { createRandom } from '../../../../shared/engine/random'

const QUBITS = 12
const VARIABLES = 9

function expectSame(chains: Memberships, model: Set<number>[]): void {
  const buffer = new Int32Array(QUBITS)
  let overlap = 0
  let used = 0
  for (let q = 0; q < QUBITS; q++) {
    const owners = model.filter((chain) => chain.has(q)).length
    expect(chains.use[q]).toBe(owners)
    overlap += Math.max(0, owners - 1)
    used += owners > 0 ? 1 : 0
  }
  expect(chains.overlap).toBe(overlap)
  expect(chains.qubitsUsed).toBe(used)
  model.forEach((chain, v) => {
    const length = chains.copyChain(v, buffer)
    expect(chains.length[v]).toBe(chain.size)
    expect(new Set(buffer.subarray(0, length))).toEqual(chain)
    expect(chains.isConflicted(v)).toBe([...chain].some((q) => model.filter((other) => other.has(q)).length > 1))
  })
}

describe('Memberships', () => {
  it('keeps chains, owners, lengths and overlap equal to recomputation under random changes', () => {
    const random = createRandom(3)
    const chains = new Memberships(VARIABLES, QUBITS)
    const model = Array.from({ length: VARIABLES }, () => new Set<number>())
    for (let step = 0; step < 1500; step++) {
      const v = random.below(VARIABLES)
      const q = random.below(QUBITS)
      expect(chains.owns(v, q)).toBe(model[v]!.has(q))
      if (random.float() < 0.02) {
        chains.drop(v)
        model[v]!.clear()
      } else if (model[v]!.has(q)) {
        if (random.float() < 0.3) {
          chains.remove(v, q)
          model[v]!.delete(q)
        }
      } else {
        chains.add(v, q)
        model[v]!.add(q)
      }
      if (step % 10 === 0) expectSame(chains, model)
    }
  })

  it('grows its store when overlap exceeds the first capacity', () => {
    const chains = new Memberships(VARIABLES, QUBITS)
    for (let v = 0; v < VARIABLES; v++) for (let q = 0; q < QUBITS; q++) chains.add(v, q)
    expectSame(
      chains,
      Array.from({ length: VARIABLES }, () => new Set(Array.from({ length: QUBITS }, (_, q) => q))),
    )
    expect(chains.overlap).toBe((VARIABLES - 1) * QUBITS)
  })
})
