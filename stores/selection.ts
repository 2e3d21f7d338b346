import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import { rangeBetween } from '~/utils/lattice/range'
import type { LatticeKind } from '~/utils/lattice/kinds'
import type { Lens } from '~/utils/lattice/types'

/**
 * Which chain is in focus, which are selected, which lens is on and what of the lattice is hidden: shared by the lattice,
 * the ledger and the problem graph, so that each follows the others. Holds variable indices only, never data of the
 * chains.
 *
 * The focus is the one chain looked at closely; the selection is any number of chains. `choose` is what a plain click
 * does, `toggle` a click with Ctrl or Cmd, `extendTo` one with Shift.
 */
export const useSelectionStore = defineStore('selection', () => {
  const scope = ref<string | null>(null)
  const hovered = ref<number | null>(null)
  const lens = ref<Lens>('occupancy')
  const chosen = chosenVariables()
  const hidden = hiddenThings()

  /** Starts afresh when another embedding comes on the page; keeps everything when it is the same one. */
  function begin(nextScope: string) {
    if (scope.value === nextScope) return
    scope.value = nextScope
    chosen.release()
    chosen.clearSelection()
    hidden.showEverything()
    hovered.value = null
  }

  function hover(variable: number | null) {
    hovered.value = variable
  }

  function setLens(next: Lens) {
    lens.value = next
  }

  return { scope, hovered, lens, begin, hover, setLens, ...chosen, ...hidden }
})

function chosenVariables() {
  const focused = ref<number | null>(null)
  const selected = shallowRef<ReadonlySet<number>>(new Set())
  /** Where a range begins: the variable last chosen or toggled. */
  const anchor = ref<number | null>(null)

  function focus(variable: number) {
    focused.value = variable
  }

  function release() {
    focused.value = null
  }

  function select(variables: Iterable<number>) {
    selected.value = new Set(variables)
  }

  function clearSelection() {
    anchor.value = null
    selected.value = new Set()
  }

  /** Brings the variable alone into focus and selection; once more lets go of both. */
  function choose(variable: number) {
    if (focused.value === variable) {
      release()
      clearSelection()
      return
    }
    anchor.value = variable
    selected.value = new Set([variable])
    focus(variable)
  }

  /** Adds the variable to the selection, or takes it out. */
  function toggle(variable: number) {
    anchor.value = variable
    selected.value = toggled(selected.value, variable)
  }

  /**
   * Selects from the anchor to the variable as they stand in `order`.
   *
   * @param isAdded keeps what was selected before
   */
  function extendTo(variable: number, order: readonly number[], isAdded = false) {
    const range = rangeBetween(order, anchor.value, variable)
    anchor.value ??= variable
    selected.value = new Set(isAdded ? [...selected.value, ...range] : range)
  }

  return { focused, selected, anchor, focus, release, select, clearSelection, choose, toggle, extendTo }
}

function hiddenThings() {
  /** Kinds of thing that the legend switched off. */
  const hiddenKinds = shallowRef<ReadonlySet<LatticeKind>>(new Set())
  /** Keys of the classes of chain that the legend switched off; see utils/lattice/kinds.ts. */
  const hiddenClasses = shallowRef<ReadonlySet<string>>(new Set())

  function toggleKind(kind: LatticeKind) {
    hiddenKinds.value = toggled(hiddenKinds.value, kind)
  }

  function toggleClass(key: string) {
    hiddenClasses.value = toggled(hiddenClasses.value, key)
  }

  function showEverything() {
    hiddenKinds.value = new Set()
    hiddenClasses.value = new Set()
  }

  return { hiddenKinds, hiddenClasses, toggleKind, toggleClass, showEverything }
}

function toggled<T>(set: ReadonlySet<T>, member: T): Set<T> {
  const next = new Set(set)
  if (!next.delete(member)) next.add(member)
  return next
}
