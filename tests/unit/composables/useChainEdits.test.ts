// @vitest-environment happy-dom
import { mount } from '@vue/test-utils'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'
import type { EmbeddingView } from '../../../shared/schemas/embeddings'
import { useChainEdits } from '../../../composables/useChainEdits'
import { latticeOf, layerOf } from '../utils/lattice/small-lattice'

const saveEdited = vi.fn()
const navigateTo = vi.fn()
const useUnsaved = vi.fn()
// What Nuxt imports by itself.
vi.stubGlobal('useEmbeddingActions', () => ({ saveEdited }))
vi.stubGlobal('navigateTo', navigateTo)
vi.stubGlobal('useUnsaved', useUnsaved)
for (const name of ['computed', 'onBeforeUnmount', 'onMounted', 'ref', 'shallowRef', 'watch'] as const)
  vi.stubGlobal(name, vue[name])

/** A triangle on a grid of 3 × 3 points: the chain of v2 joins qubits 3 and 4. */
const NO_PAIRS = new Uint32Array()
const GRID = {
  ...latticeOf({ kind: 'square', width: 3, height: 3 }),
  missingCouplers: NO_PAIRS,
  couplersOfMissing: NO_PAIRS,
}
const LAYER = layerOf(
  [[0], [1], [3, 4]],
  [
    [0, 1],
    [0, 2],
    [1, 2],
  ],
)
const CHAINS = { ...LAYER, couplers: new Uint32Array(3), ranges: {} } as unknown as Parameters<
  typeof useChainEdits
>[0]['chains']
const EMBEDDING = { id: 'e1', problem: { id: 'p' }, machine: { id: 'm' } } as EmbeddingView

function edits() {
  let made: ReturnType<typeof useChainEdits>
  const wrapper = mount({
    setup() {
      made = useChainEdits({ embedding: EMBEDDING, lattice: GRID, chains: CHAINS })
      return () => vue.h('p')
    },
  })
  return { ...made!, wrapper }
}
const press = (key: string, rest: KeyboardEventInit = {}) =>
  document.dispatchEvent(new KeyboardEvent('keydown', { key, ctrlKey: true, ...rest }))

beforeEach(() => vi.clearAllMocks())

describe('useChainEdits', () => {
  it('tells at once which rules a step breaks, and takes it back and does it again', () => {
    const { apply, undo, redo, violations, changed, layer, wrapper } = edits()
    expect(violations.value).toEqual([])
    expect(layer.value).toBe(CHAINS)
    apply({ kind: 'free', variable: 2, qubit: 4 })
    expect(violations.value.map(({ message }) => message)).toEqual([
      'No coupler joins the chains of v1 and v2, which interact.',
    ])
    expect(changed.value).toEqual([2])
    undo()
    expect(violations.value).toEqual([])
    redo()
    press('z')
    expect(changed.value).toEqual([])
    press('z', { shiftKey: true })
    expect([...layer.value.qubits]).toEqual([0, 1, 3])
    wrapper.unmount()
  })

  it('guards what is not saved, and forgets it once it is', async () => {
    const { apply, save, isUnsaved, failure, wrapper } = edits()
    const isGuarded = useUnsaved.mock.calls[0]![0] as () => boolean
    expect(isGuarded()).toBe(false)
    apply({ kind: 'add', variable: 1, qubit: 2 })
    expect(isGuarded()).toBe(true)

    const refused = { status: 422, code: 'embedding.invalid', message: 'Qubit 2 is missing.', issues: [] }
    saveEdited.mockResolvedValueOnce({ ok: false, failure: refused })
    await save()
    expect(failure.value).toEqual(refused)
    expect(isUnsaved.value).toBe(true)

    saveEdited.mockResolvedValueOnce({ ok: true, value: { id: 'e2' } })
    await save()
    expect(saveEdited).toHaveBeenLastCalledWith(EMBEDDING, { v0: [0], v1: [1, 2], v2: [3, 4] })
    expect(navigateTo).toHaveBeenCalledWith('/embeddings/e2')
    expect(isGuarded()).toBe(false)
    wrapper.unmount()
  })

  it('lets a refusal go with the next step', async () => {
    const { apply, save, failure, wrapper } = edits()
    apply({ kind: 'add', variable: 1, qubit: 2 })
    saveEdited.mockResolvedValueOnce({ ok: false, failure: { status: 422, code: '', message: '', issues: [] } })
    await save()
    apply({ kind: 'add', variable: 1, qubit: 5 })
    await vue.nextTick()
    expect(failure.value).toBe(null)
    wrapper.unmount()
  })
})
