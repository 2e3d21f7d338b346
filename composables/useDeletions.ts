import type { DeletableKind, DeletionView } from '#shared/schemas/deletions'
import type { Outcome } from './useApi'

const PATHS: Record<DeletableKind, string> = { problem: 'problems', embedding: 'embeddings', 'run sheet': 'run-sheets' }

/** Deleting things and bringing them back. */
export function useDeletions() {
  const api = useApi()
  const store = useDeletionStore()
  const { load } = useSession()

  /** Deletes a thing and offers to undo it. */
  async function erase(kind: DeletableKind, id: string, label: string): Promise<Outcome<DeletionView>> {
    const outcome = await api.remove<DeletionView>(`/api/${PATHS[kind]}/${id}`)
    if (!outcome.ok) return outcome
    store.add({ kind, id, label, until: Date.parse(outcome.value.restorableUntil) })
    await load()
    return outcome
  }

  async function restore(id: string): Promise<void> {
    const deletion = store.items.find((item) => item.id === id)
    if (!deletion || deletion.state === 'restoring') return
    store.change(id, { state: 'restoring' })
    const outcome = await api.post(`/api/${PATHS[deletion.kind]}/${id}/restore`)
    store.change(id, outcome.ok ? { state: 'restored' } : { state: 'failed', failure: outcome.failure.message })
    if (outcome.ok) await Promise.all([load(), refreshNuxtData()])
  }

  const pathOf = ({ kind, id }: { kind: DeletableKind; id: string }): string => `/${PATHS[kind]}/${id}`
  return { items: computed(() => store.items), erase, restore, drop: store.drop, pathOf }
}
