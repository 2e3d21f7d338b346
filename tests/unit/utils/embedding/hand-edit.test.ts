import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { verifyEmbedding } from '../../../../shared/engine/embedding/verify'
import { additionsTo, addingEffects, freeingEffects } from '../../../../utils/embedding/edit-effects'
import type { EditEffect, EditState } from '../../../../utils/embedding/edit-effects'
import { effectWords } from '../../../../utils/embedding/edit-words'
import {
  chainsAfter,
  changedVariables,
  editedLayer,
  namedChains,
  NO_EDITS,
  redone,
  undone,
  withEdit,
} from '../../../../utils/embedding/hand-edit'
import type { EditHistory } from '../../../../utils/embedding/hand-edit'
import { machineGraphOf } from '../../../../utils/lattice/machine-graph'
import { neighboursOf } from '../../../../utils/lattice/roles'
import { latticeOf, layerOf, seeded } from '../lattice/small-lattice'

/** A grid of 4 × 3 points, numbered row by row. */
const GRID = latticeOf({ kind: 'square', width: 4, height: 3 })
const MACHINE = machineGraphOf(GRID)
const LAYER = layerOf(
  [[0, 1], [2], [4, 5]],
  [
    [0, 1],
    [0, 2],
    [1, 2],
  ],
)

const steps = (...edits: EditHistory['edits']): EditHistory => edits.reduce(withEdit, NO_EDITS)

describe('the history of edits', () => {
  const add = { kind: 'add', variable: 2, qubit: 6 } as const
  const free = { kind: 'free', variable: 0, qubit: 0 } as const

  it('is applied in order, up to what was taken back', () => {
    const history = steps(add, free)
    expect(chainsAfter(LAYER, history)).toEqual([[1], [2], [4, 5, 6]])
    expect(chainsAfter(LAYER, undone(history))).toEqual([[0, 1], [2], [4, 5, 6]])
    expect(chainsAfter(LAYER, redone(undone(undone(history))))).toEqual([[0, 1], [2], [4, 5, 6]])
    expect(undone(undone(undone(history))).done).toBe(0)
    expect(redone(history)).toEqual(history)
  })

  it('forgets what was taken back when something else is done', () => {
    const history = withEdit(undone(steps(add, free)), { kind: 'free', variable: 2, qubit: 4 })
    expect(history.edits).toHaveLength(2)
    expect(chainsAfter(LAYER, redone(history))).toEqual([[0, 1], [2], [5, 6]])
  })

  it('tells which chains differ, not how they came to', () => {
    const back = steps(free, add, { ...free, kind: 'add' })
    expect(changedVariables(LAYER, chainsAfter(LAYER, back))).toEqual([2])
    expect(changedVariables(LAYER, chainsAfter(LAYER, NO_EDITS))).toEqual([])
  })

  it('gives the lattice and the ledger what they need, and the server the chains by name', () => {
    const chains = chainsAfter(LAYER, steps(add))
    const ranges = {} as Parameters<typeof editedLayer>[0]['ranges']
    const layer = editedLayer({ ...LAYER, couplers: new Uint32Array(3), ranges }, MACHINE, chains)
    expect([...layer.offsets]).toEqual([0, 2, 3, 6])
    // 0–4 and 1–5 join the first and the third chain, 1–2 the first two, 2–6 the second and the third.
    expect([...layer.couplers]).toEqual([3, 2, 3])
    expect(namedChains(LAYER.labels, GRID.ids, chains)).toEqual({ v0: [0, 1], v1: [2], v2: [4, 5, 6] })
  })
})

/** What the checker says before and after, for any step. */
function byChecker(state: EditState, edges: number[], effect: EditEffect) {
  const problem = graphFromEdges(state.chains.length, edges)
  const broken = (chains: readonly (readonly number[])[]) =>
    verifyEmbedding(problem, state.machine, state.usable, chains)
  const after = state.chains.map((chain, i) => {
    if (i !== effect.variable) return chain
    return effect.kind === 'add' ? [...chain, effect.qubit] : chain.filter((q) => q !== effect.qubit)
  })
  const missing = (violations: ReturnType<typeof broken>) =>
    violations.flatMap(({ rule, variables }) =>
      rule === 'missing coupler' && variables.includes(effect.variable)
        ? variables.filter((v) => v !== effect.variable)
        : [],
    )
  const [was, is] = [broken(state.chains), broken(after)]
  const own = is.filter(({ variables }) => variables.length === 1 && variables[0] === effect.variable)
  return {
    connected: own.every(({ rule }) => rule !== 'disconnected chain' && rule !== 'empty chain'),
    meets: missing(was).filter((v) => !missing(is).includes(v)),
    loses: missing(is).filter((v) => !missing(was).includes(v)),
  }
}

describe('the effect of a step', () => {
  const state: EditState = {
    machine: MACHINE,
    usable: GRID.usable,
    chains: [[0, 1], [2], [4, 5]],
    neighbours: neighboursOf(LAYER),
  }

  it('is listed with the most useful qubit first', () => {
    const adding = addingEffects(state, 2)
    expect(adding[0]).toMatchObject({ qubit: 6, meets: [1], pieces: 1 })
    expect(adding.map(({ qubit }) => qubit)).toEqual([6, 8, 9])
    expect(freeingEffects(state, 0)).toMatchObject([
      { qubit: 0, pieces: 1, loses: [], couplers: 1 },
      { qubit: 1, pieces: 1, loses: [1], couplers: 2 },
    ])
  })

  it('agrees with the checker on random states', () => {
    const random = seeded(3)
    let seen = { meets: 0, loses: 0, apart: 0 }
    for (let round = 0; round < 120; round++) {
      const chains: number[][] = [[], [], [], []]
      for (let q = 0; q < 12; q++) if (random() < 0.7) chains[Math.floor(4 * random())]!.push(q)
      const usable = Uint8Array.from({ length: 12 }, (_, q) => (random() < 0.9 || chains.flat().includes(q) ? 1 : 0))
      const edges = [0, 1, 0, 2, 0, 3, 1, 2]
      const layer = layerOf(chains, [
        [0, 1],
        [0, 2],
        [0, 3],
        [1, 2],
      ])
      const random4: EditState = { machine: MACHINE, usable, chains, neighbours: neighboursOf(layer) }
      const free = Array.from(usable, (works, q) => q).filter((q) => usable[q] && !chains.flat().includes(q))
      const effects = [
        ...freeingEffects(random4, 0),
        ...free.map(additionsTo(random4, 0)),
        ...addingEffects(random4, 0),
      ]
      for (const effect of effects) {
        const { pieces, meets, loses } = effect
        expect({ connected: pieces === 1, meets: [...meets].sort(), loses: [...loses].sort() }).toEqual(
          byChecker(random4, edges, effect),
        )
        seen = {
          meets: seen.meets + meets.length,
          loses: seen.loses + loses.length,
          apart: seen.apart + (pieces > 1 ? 1 : 0),
        }
      }
    }
    expect(Math.min(seen.meets, seen.loses, seen.apart)).toBeGreaterThan(10)
  })

  it('is said in words', () => {
    const base = { variable: 0, qubit: 9, meets: [], loses: [], couplers: 0, pieces: 1 }
    const say = (effect: Partial<EditEffect>, before = 1) =>
      effectWords({ ...base, kind: 'add', ...effect }, before, ['a', 'b', 'c'])
    expect(say({ couplers: 2 })).toEqual({
      words: 'keeps the chain connected; 2 couplers to interacting chains',
      breaks: false,
    })
    expect(say({ meets: [1, 2], couplers: 2 })).toEqual({
      words: 'keeps the chain connected; meets b and c, which had no coupler',
      breaks: false,
    })
    expect(say({ kind: 'free', pieces: 2, loses: [1] })).toEqual({
      words: 'breaks the chain into 2 pieces; takes the only coupler to b',
      breaks: true,
    })
    expect(say({ pieces: 2 }).words).toBe('not coupled to the chain')
    expect(say({ pieces: 1 }, 2)).toEqual({ words: 'makes the chain whole', breaks: false })
    expect(say({ kind: 'free', pieces: 0 }).breaks).toBe(true)
  })
})
