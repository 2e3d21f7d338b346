import type { ChainRow } from '#shared/schemas/run-sheets'
import type { StrengthDraft } from '~/utils/run-sheet/draft'
import type { StrengthEdit, StrengthGround } from '~/utils/run-sheet/strength-edits'
import { editStrengths } from '~/utils/run-sheet/strength-edits'

interface Edited {
  chains: () => readonly ChainRow[]
  strength: () => StrengthDraft
  ground: () => StrengthGround
  change: (strength: StrengthDraft) => void
}

const MOST_KEPT = 50

/** Changes the strengths of chosen chains, and takes such changes back, the last one first. */
export function useStrengthEdits({ chains, strength, ground, change }: Edited) {
  const before = shallowRef<readonly StrengthDraft[]>([])
  function apply(chosen: ReadonlySet<number>, edit: StrengthEdit): void {
    before.value = [...before.value.slice(1 - MOST_KEPT), strength()]
    change(editStrengths(strength(), chains(), chosen, edit, ground()))
  }
  function undo(): void {
    const last = before.value.at(-1)
    if (!last) return
    before.value = before.value.slice(0, -1)
    change(last)
  }
  // Another rule was chosen since: what was before the edits no longer follows from it.
  watch(
    () => strength().rule,
    (rule) => {
      if (rule !== 'manual') before.value = []
    },
  )
  return { apply, undo, canUndo: computed(() => before.value.length > 0) }
}
