// @vitest-environment happy-dom
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'
import { useLatticeTools } from '../../../composables/useLatticeTools'
import { useSelectionStore } from '../../../stores/selection'
import { ownersIn } from '../../../utils/embedding/hand-edit'
import { HAND_DRAWN, layerOf } from '../utils/lattice/small-lattice'

// What Nuxt imports by itself.
vi.stubGlobal('useSelectionStore', useSelectionStore)
for (const name of ['ref', 'shallowRef', 'watch'] as const) vi.stubGlobal(name, vue[name])

/** 10–13 and 12; 11 and 14 are free, or 14 missing. */
const CHAINS = layerOf([[0, 3], [2]], [[0, 1]])
const owner = ownersIn(CHAINS, 5)
const pickOf = (qubit: number | null) => ({
  qubit,
  variable: qubit === null || owner[qubit]! < 0 ? null : owner[qubit]!,
  additive: false,
})

function tools() {
  const apply = vi.fn()
  const data = { ...HAND_DRAWN, usable: Uint8Array.of(1, 1, 1, 1, 0) }
  const made = useLatticeTools(() => ({ data, chains: CHAINS, owner }), apply)
  const showQubits = vi.fn()
  made.view.value = { showQubits, drawn: vi.fn() }
  return { ...made, apply, showQubits, selection: useSelectionStore() }
}

beforeEach(() => setActivePinia(createPinia()))

describe('finding', () => {
  it('moves to a chain and brings it into focus', () => {
    const { find, showQubits, selection, overlay } = tools()
    find({ kind: 'chain', variable: 0 })
    expect(selection.focused).toBe(0)
    expect(showQubits).toHaveBeenCalledWith([0, 3])
    expect(overlay.value).toBe(null)
  })

  it('outlines a qubit, with the chain that uses it in focus', () => {
    const { find, pick, showQubits, selection, overlay } = tools()
    find({ kind: 'qubit', qubit: 1 })
    expect(overlay.value).toEqual({ qubits: [1], couplers: [] })
    expect(selection.focused).toBe(null)
    find({ kind: 'qubit', qubit: 2 })
    expect(selection.focused).toBe(1)
    expect(showQubits).toHaveBeenLastCalledWith([2])
    pick(pickOf(null))
    expect(overlay.value).toBe(null)
  })
})

describe('clicks while chains are edited', () => {
  it('change nothing while no tool or another is open', () => {
    const { pick, apply, tool } = tools()
    pick(pickOf(1))
    tool.value = 'path'
    pick(pickOf(1))
    expect(apply).not.toHaveBeenCalled()
  })

  it('pick a chain, add free qubits to it and free its own', async () => {
    const { pick, apply, tool, said, selection } = tools()
    tool.value = 'edit'
    await vue.nextTick()
    pick(pickOf(1))
    expect(said.value).toBe('Pick a chain first.')
    pick(pickOf(3))
    expect(selection.focused).toBe(0)
    expect(apply).not.toHaveBeenCalled()
    pick(pickOf(1))
    expect(apply).toHaveBeenLastCalledWith({ kind: 'add', variable: 0, qubit: 1 })
    expect(said.value).toBe('Qubit 11 was added to v0.')
    pick(pickOf(3))
    expect(apply).toHaveBeenLastCalledWith({ kind: 'free', variable: 0, qubit: 3 })
    expect(said.value).toBe('Qubit 13 was freed.')
  })

  it('say why a missing qubit cannot be used, and go on with another chain', async () => {
    const { pick, apply, tool, said, selection } = tools()
    tool.value = 'edit'
    await vue.nextTick()
    selection.focus(0)
    pick(pickOf(4))
    expect(said.value).toBe('Qubit 14 is missing: no chain can use it.')
    pick(pickOf(2))
    expect(selection.focused).toBe(1)
    pick(pickOf(null))
    expect(apply).not.toHaveBeenCalled()
  })
})
