import type { EmbeddingView } from '#shared/schemas/embeddings'
import type { EmbeddingOfProblem } from '#shared/schemas/problems'
import type { ApiFailure, Outcome } from './useApi'
import type { SearchSettings, StartSettings } from '~/utils/embedding/search'
import { freshSeed } from '~/utils/embedding/search'

/** What is done from the page of an embedding; each action leads to what it made, or leaves its failure behind. */
export function useEmbeddingWork(
  embedding: Ref<EmbeddingView | undefined>,
  siblings: Ref<readonly EmbeddingOfProblem[] | null>,
) {
  const { create } = useRunSheetActions()
  const { start, startFrom } = useEmbeddingActions()
  const busy = ref(false)
  const refused = shallowRef<ApiFailure | null>(null)
  /** Why no embedding could be made from this one; said beside its form. */
  const notMade = shallowRef<ApiFailure | null>(null)

  async function act(action: () => Promise<Outcome<{ id: string }>>, path: string, failed: typeof refused) {
    busy.value = true
    failed.value = null
    const outcome = await action()
    if (outcome.ok) await navigateTo(`${path}/${outcome.value.id}`)
    else failed.value = outcome.failure
    busy.value = false
  }
  const prepare = () => act(() => create({ embeddingId: embedding.value!.id }), '/run-sheets', refused)
  const again = (settings: SearchSettings) => {
    const { problem, machine } = embedding.value!
    return act(() => start({ problemId: problem.id, machineId: machine.id, ...settings }), '/embeddings', refused)
  }
  const improve = (settings: StartSettings) => {
    const seed = freshSeed(siblings.value ?? [embedding.value!])
    return act(() => startFrom(embedding.value!, seed, settings), '/embeddings', notMade)
  }
  return { busy, refused, notMade, prepare, again, improve }
}

/** Marking one of the embeddings of a problem on a machine as the one to go on with. */
export function useChosenMark(refresh: () => Promise<unknown>) {
  const { choose: mark } = useEmbeddingActions()
  const unmarked = ref('')
  const choose = async (id: string, chosen: boolean): Promise<void> => {
    const outcome = await mark(id, chosen)
    unmarked.value = outcome.ok ? '' : outcome.failure.message
    await refresh()
  }
  return { unmarked, choose }
}
