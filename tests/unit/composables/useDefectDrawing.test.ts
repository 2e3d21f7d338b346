import { describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'
import type { LatticeArrays } from '../../../composables/useMachines'
import { latticeOf } from '../utils/lattice/small-lattice'

// What Nuxt imports by itself in a composable.
for (const name of ['computed', 'ref', 'shallowRef', 'watch'] as const) vi.stubGlobal(name, vue[name])
const { useDefectDrawing } = await import('../../../composables/useDefectDrawing')

/* A square grid of 3 × 3: qubits 0 to 8, row by row. */
const GRID: LatticeArrays = {
  ...latticeOf({ kind: 'square', width: 3, height: 3 }),
  missingCouplers: new Uint32Array(),
  couplersOfMissing: new Uint32Array(),
}
const click = (qubit: number | null) => ({ qubit, variable: null, additive: false })

function drawing(typed: string) {
  const text = vue.ref(typed)
  return { text, ...useDefectDrawing(() => GRID, text) }
}

describe('useDefectDrawing', () => {
  it('switches a qubit by a click, in the list that is typed', () => {
    const { text, pick, said, marks } = drawing('4 # known')
    pick(click(7))
    expect(text.value).toBe('4 # known\n7')
    expect(said.value).toBe('Qubit 7 is missing now. Listed: 2 qubits and no couplers.')
    expect([...marks.value!.qubits]).toEqual([4, 7])
    pick(click(4))
    expect(text.value).toBe('# known\n7')
    expect(said.value).toMatch(/^Qubit 4 is working now/)
  })

  it('counts what is listed from now on, where the form renders the text later', () => {
    let rendered = '4'
    const later = vue.customRef<string>(() => ({
      get: () => rendered,
      set: (next) => queueMicrotask(() => (rendered = next)),
    }))
    const { pick, said } = useDefectDrawing(() => GRID, later)
    pick(click(7))
    expect(said.value).toBe('Qubit 7 is missing now. Listed: 2 qubits and no couplers.')
  })

  it('switches a coupler by its two ends, and begins anew where there is none', async () => {
    const { text, kind, pick, said, overlay } = drawing('')
    kind.value = 'couplers'
    await vue.nextTick()
    pick(click(0))
    expect(overlay.value!.qubits).toEqual([0])
    pick(click(8))
    expect(said.value).toBe('There is no coupler between qubits 0 and 8. Qubit 8 is picked instead.')
    expect(overlay.value!.qubits).toEqual([8])
    pick(click(7))
    expect(text.value).toBe('8-7')
    expect(overlay.value).toBeNull()
    pick(click(3))
    pick(click(3))
    expect(overlay.value).toBeNull()
  })

  it('takes parts by number', () => {
    const { text, toggleNamed, said } = drawing('')
    expect(toggleNamed('4')).toBe(true)
    expect(toggleNamed('0-1')).toBe(true)
    expect(text.value).toBe('4, 0-1')
    expect(toggleNamed('4-5')).toBe(false)
    expect(said.value).toMatch(/missing with qubit 4/)
    expect(toggleNamed('99')).toBe(false)
    expect(toggleNamed('1, 2')).toBe(false)
    expect(said.value).toMatch(/Name one qubit/)
    expect(text.value).toBe('4, 0-1')
  })

  it('takes steps back, whatever was typed since', () => {
    const { text, pick, undo, steps } = drawing('4')
    pick(click(7))
    pick(click(4))
    text.value = `${text.value}, 1, 7`
    undo()
    expect(text.value).toBe('7, 1, 7, 4')
    undo()
    expect(text.value).toBe('1, 4')
    expect(steps.value).toEqual([])
    undo()
    expect(text.value).toBe('1, 4')
  })
})
