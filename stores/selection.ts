import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import type { Lens } from '~/utils/lattice/types'

/**
 * Which chain is in focus, which are selected, and which lens is on: shared by the lattice, the ledger and the problem
 * graph, so that each follows the others. Holds variable indices only, never data of the chains.
 */
export const useSelectionStore = defineStore('selection', () => {
  const scope = ref<string | null>(null)
  const focused = ref<number | null>(null)
  const hovered = ref<number | null>(null)
  const selected = shallowRef<ReadonlySet<number>>(new Set())
  const lens = ref<Lens>('occupancy')

  /** Starts afresh when another embedding comes on the page; keeps everything when it is the same one. */
  function begin(nextScope: string) {
    if (scope.value === nextScope) return
    scope.value = nextScope
    release()
    clearSelection()
    hovered.value = null
  }

  function focus(variable: number) {
    focused.value = variable
  }

  function release() {
    focused.value = null
  }

  function hover(variable: number | null) {
    hovered.value = variable
  }

  /** Adds the variable to the selection, or takes it out. */
  function toggle(variable: number) {
    const next = new Set(selected.value)
    if (!next.delete(variable)) next.add(variable)
    selected.value = next
  }

  function select(variables: Iterable<number>) {
    selected.value = new Set(variables)
  }

  function clearSelection() {
    selected.value = new Set()
  }

  function setLens(next: Lens) {
    lens.value = next
  }

  return {
    scope,
    focused,
    hovered,
    selected,
    lens,
    begin,
    focus,
    release,
    hover,
    toggle,
    select,
    clearSelection,
    setLens,
  }
})
