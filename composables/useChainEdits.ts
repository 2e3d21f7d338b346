import { verifyEmbedding } from '#shared/engine/embedding/verify'
import { graphFromEdges } from '#shared/engine/graph/build'
import type { EmbeddingView } from '#shared/schemas/embeddings'
import type { ApiFailure } from './useApi'
import type { LatticeArrays } from './useMachines'
import type { EditState } from '~/utils/embedding/edit-effects'
import { ownersOf } from '~/utils/embedding/edit-effects'
import {
  chainsAfter,
  changedVariables,
  editedLayer,
  namedChains,
  NO_EDITS,
  redone,
  undone,
  withEdit,
} from '~/utils/embedding/hand-edit'
import type { HandEdit } from '~/utils/embedding/hand-edit'
import type { EmbeddingChains } from '~/utils/embedding/layers'
import { machineGraphOf } from '~/utils/lattice/machine-graph'
import { neighboursOf } from '~/utils/lattice/roles'

interface EditedThing {
  readonly embedding: EmbeddingView
  readonly lattice: LatticeArrays
  readonly chains: EmbeddingChains
}

/**
 * Editing the chains of an embedding by hand: steps with undo and redo, the chains as they stand, every rule they break,
 * and saving them as an embedding of their own. Nothing typed or done is lost unasked.
 */
export function useChainEdits(thing: EditedThing) {
  const { history, ...steps } = useEditHistory()
  const isSaving = ref(false)
  const failure = shallowRef<ApiFailure | null>(null)
  const { saveEdited } = useEmbeddingActions()

  const machine = computed(() => machineGraphOf(thing.lattice))
  const problem = computed(() => graphFromEdges(thing.chains.labels.length, thing.chains.neighbours))
  const neighbours = computed(() => neighboursOf(thing.chains))
  const lists = computed(() => chainsAfter(thing.chains, history.value))
  const state = computed<EditState>(() => ({
    machine: machine.value,
    usable: thing.lattice.usable,
    chains: lists.value,
    neighbours: neighbours.value,
  }))
  const owner = computed(() => ownersOf(state.value))
  const changed = computed(() => changedVariables(thing.chains, lists.value))
  const layer = computed(() =>
    history.value.done === 0 ? thing.chains : editedLayer(thing.chains, machine.value, lists.value),
  )
  /** Every broken rule, in words, as the separate checker names it. */
  const violations = computed(() =>
    verifyEmbedding(problem.value, machine.value, thing.lattice.usable, lists.value, {
      label: (variable) => thing.chains.labels[variable]!,
      qubitName: (qubit) => String(thing.lattice.ids[qubit]),
    }),
  )
  const isUnsaved = computed(() => changed.value.length > 0)

  watch(history, () => (failure.value = null))

  async function save(): Promise<void> {
    isSaving.value = true
    failure.value = null
    const { labels } = thing.chains
    const outcome = await saveEdited(thing.embedding, namedChains(labels, thing.lattice.ids, lists.value))
    if (outcome.ok) {
      history.value = NO_EDITS
      await navigateTo(`/embeddings/${outcome.value.id}`)
    } else failure.value = outcome.failure
    isSaving.value = false
  }

  useUnsaved(() => isUnsaved.value, 'the chains you edited by hand')
  useEditKeys(steps.undo, steps.redo, () => history.value.edits.length > 0)
  return {
    history,
    machine,
    neighbours,
    state,
    owner,
    changed,
    layer,
    violations,
    isUnsaved,
    isSaving,
    failure,
    ...steps,
    save,
  }
}

/** The steps so far, and moving among them. */
function useEditHistory() {
  const history = shallowRef(NO_EDITS)
  return {
    history,
    apply: (edit: HandEdit): void => void (history.value = withEdit(history.value, edit)),
    undo: (): void => void (history.value = undone(history.value)),
    redo: (): void => void (history.value = redone(history.value)),
    /** Takes every step back; each can be done again. */
    takeAllBack: (): void => void (history.value = { ...history.value, done: 0 }),
  }
}

const TAKES_KEYS = 'input, textarea, select, [contenteditable], [role="dialog"]'

/** Ctrl or Cmd with Z takes a step back; with Shift, or with Y, it is done again. */
function useEditKeys(undo: () => void, redo: () => void, isOn: () => boolean): void {
  const onKey = (event: KeyboardEvent): void => {
    const isTyping = event.target instanceof Element && event.target.closest(TAKES_KEYS) !== null
    if (!isOn() || isTyping || event.altKey || !(event.ctrlKey || event.metaKey)) return
    const key = event.key.toLowerCase()
    if (key !== 'z' && key !== 'y') return
    event.preventDefault()
    if (key === 'y' || event.shiftKey) redo()
    else undo()
  }
  onMounted(() => document.addEventListener('keydown', onKey))
  onBeforeUnmount(() => document.removeEventListener('keydown', onKey))
}
