import type { HandEdit } from '~/utils/embedding/hand-edit'
import type { DrawnLattice } from '~/utils/lattice/export/layout'
import type { Found } from '~/utils/lattice/find'
import type { ChainLayer, LatticeData, LatticePick, OverlayLayer } from '~/utils/lattice/types'

/** What is open beside the lattice. */
export type LatticeTool = 'path' | 'neighbours' | 'edit'

/** What the lattice drawing offers to the tools. */
export interface LatticeHandle {
  showQubits(qubits: readonly number[]): void
  /** Everything that is drawn, and what of it is in view; nothing in view before the first frame. */
  drawn(): Omit<DrawnLattice, 'seen'> & { readonly seen: DrawnLattice['seen'] | null }
}

interface ToolSubject {
  readonly data: LatticeData
  /** As they are shown. */
  readonly chains: ChainLayer
  /** Chain of each qubit, or −1. */
  readonly owner: Int32Array
}

/** The tools of the lattice of an embedding: which is open, what it outlines, and what clicks and finds do. */
export function useLatticeTools(subject: () => ToolSubject, apply: (edit: HandEdit) => void) {
  const selection = useSelectionStore()
  const view = shallowRef<LatticeHandle | null>(null)
  const tool = ref<LatticeTool | null>(null)
  const overlay = shallowRef<OverlayLayer | null>(null)
  /** What the last click did while chains are edited. */
  const said = ref('')

  watch(tool, () => {
    overlay.value = null
    said.value = ''
  })

  function drawn(): DrawnLattice | null {
    const now = view.value?.drawn()
    return now ? { ...now, seen: now.seen ?? now.source.bounds } : null
  }
  const show = (qubits: readonly number[]): void => view.value?.showQubits(qubits)

  function find(found: Found): void {
    const { chains, owner } = subject()
    if (found.kind === 'chain') {
      selection.focus(found.variable)
      show(Array.from(chains.qubits.subarray(chains.offsets[found.variable], chains.offsets[found.variable + 1])))
      return
    }
    const chain = owner[found.qubit]!
    if (chain >= 0) selection.focus(chain)
    overlay.value = { qubits: [found.qubit], couplers: [] }
    show([found.qubit])
  }

  /** A click in the lattice: steps of editing, else the end of what a find pointed out. */
  function pick({ qubit, variable }: LatticePick): void {
    if (tool.value === 'edit' && qubit !== null) editAt(qubit, variable)
    else if (tool.value === null) overlay.value = null
  }

  function editAt(qubit: number, variable: number | null): void {
    const { data, chains } = subject()
    const { labels } = chains
    const chain = selection.focused
    const name = `Qubit ${data.ids[qubit]}`
    if (variable !== null && variable !== chain) {
      selection.focus(variable)
      said.value = `${labels[variable]} is edited now.`
    } else if (chain === null) said.value = 'Pick a chain first.'
    else if (!data.usable[qubit] && variable === null) said.value = `${name} is missing: no chain can use it.`
    else {
      overlay.value = null
      apply({ kind: variable === chain ? 'free' : 'add', variable: chain, qubit })
      said.value = variable === chain ? `${name} was freed.` : `${name} was added to ${labels[chain]}.`
    }
  }

  return { view, tool, overlay, said, drawn, show, find, pick }
}
