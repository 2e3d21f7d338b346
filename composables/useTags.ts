import type { Page } from '#shared/schemas/common'
import type { LibrarySummary } from '#shared/schemas/library'
import type { ApiFailure } from './useApi'

/** Tags of the workspace with how many problems bear each. */
export const useTagsInUse = () => useWholeList<Page<LibrarySummary['tags'][number]>>('/api/problems/tags')

/** Adding and taking away tags of problems, one change after the other. */
export function useTags(refresh: () => Promise<unknown>) {
  const { tag } = useProblemActions()
  const busy = ref<string | null>(null)
  const failure = shallowRef<(ApiFailure & { id: string }) | null>(null)

  const change = async (id: string, edit: { add?: string[]; remove?: string[] }): Promise<void> => {
    busy.value = id
    const outcome = await tag(id, edit)
    failure.value = outcome.ok ? null : { ...outcome.failure, id }
    if (outcome.ok) await refresh()
    busy.value = null
  }
  return {
    busy,
    failure,
    add: (id: string, tag: string) => change(id, { add: [tag] }),
    remove: (id: string, tag: string) => change(id, { remove: [tag] }),
  }
}
