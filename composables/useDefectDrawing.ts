import type { DefectPart } from '#shared/engine/machine/defect-edit'
import { withPart } from '#shared/engine/machine/defect-edit'
import { parseDefectText } from '#shared/engine/machine/defects'
import type { LatticeArrays } from './useMachines'
import type { LatticePick, OverlayLayer } from '~/utils/lattice/types'
import { drawnChange, isListed, listedDefects, listedText, partText, refusalOf } from '~/utils/machine/drawn-defects'
import { changeMarks } from '~/utils/machine/marks'

export type DrawnKind = 'qubits' | 'couplers'

const WORDS = { lost: 'missing from now on', regained: 'working again' }

/** Marking missing parts on the lattice: a second view of the list that is typed, with steps that can be taken back. */
export function useDefectDrawing(lattice: () => LatticeArrays, text: Ref<string>) {
  const kind = ref<DrawnKind>('qubits')
  /** The end of a coupler that was picked first, by published number. */
  const end = ref<number | null>(null)
  const said = ref('')
  const steps = shallowRef<readonly { part: DefectPart; was: boolean }[]>([])

  const listed = computed(() => listedDefects(text.value))
  const marks = computed(() => changeMarks(lattice(), drawnChange(lattice(), listed.value), WORDS))
  const overlay = computed<OverlayLayer | null>(() =>
    end.value === null ? null : { qubits: [lattice().ids.indexOf(end.value)], couplers: [] },
  )
  watch(kind, () => (end.value = null))

  /** Told of the list as it will be: a text that belongs to a form is the new one only after its next rendering. */
  function set(part: DefectPart, isMissing: boolean): void {
    const next = withPart(text.value, part, isMissing)
    text.value = next
    said.value = `${partText(part)} is ${isMissing ? 'missing' : 'working'} now. ${listedText(next)}`
  }

  /** @returns whether the part could be switched; the answer is in `said` */
  function toggle(part: DefectPart): boolean {
    const refusal = refusalOf(lattice(), listed.value, part)
    if (refusal) said.value = refusal
    if (refusal) return false
    const was = isListed(listed.value, part)
    steps.value = [...steps.value, { part, was }]
    set(part, !was)
    return true
  }

  function undo(): void {
    const last = steps.value.at(-1)
    if (!last) return
    steps.value = steps.value.slice(0, -1)
    set(last.part, last.was)
  }

  /** A click in the lattice. */
  function pick({ qubit }: LatticePick): void {
    if (qubit === null) return void (end.value = null)
    const id = lattice().ids[qubit]!
    if (kind.value === 'qubits') return void toggle([id])
    if (end.value === null || end.value === id) {
      const isDropped = end.value === id
      end.value = isDropped ? null : id
      said.value = isDropped ? 'No qubit is picked.' : `Qubit ${id} is picked. Pick the other end of the coupler.`
    } else if (toggle([end.value, id])) end.value = null
    else {
      end.value = id
      said.value += ` Qubit ${id} is picked instead.`
    }
  }

  /** A part named by keys: `17` or `17-42`. @returns whether it was switched */
  function toggleNamed(typed: string): boolean {
    const { qubits, couplers } = parseDefectText(typed)
    const [part] = [...couplers, ...qubits.map((id) => [id] as const)]
    if (part && qubits.length + couplers.length === 1) return toggle(part)
    said.value = 'Name one qubit, such as 17, or one coupler, such as 17-42.'
    return false
  }

  return { kind, said, steps, marks, overlay, listed, pick, toggleNamed, undo }
}
