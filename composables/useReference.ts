import type { Page } from '#shared/schemas/common'
import type { ReferenceItem, StartReference } from '#shared/schemas/reference'
import type { ApiFailure } from './useApi'

/** The looks for the optimum of one version of a problem, and how one is begun at the current version. */
export async function useReference(problemId: string, version: MaybeRefOrGetter<number>) {
  const api = useApi()
  const { data, failure, refresh } = await useWholeList<Page<ReferenceItem>>(
    () => `/api/problems/${problemId}/references?version=${toValue(version)}`,
  )
  const busy = ref(false)
  const refused = shallowRef<ApiFailure | null>(null)

  async function start(settings: Partial<StartReference>): Promise<void> {
    busy.value = true
    const outcome = await api.post<{ jobId: string }>(`/api/problems/${problemId}/reference`, settings)
    refused.value = outcome.ok ? null : outcome.failure
    await refresh()
    busy.value = false
  }
  return { looks: computed(() => data.value?.items ?? []), failure, refresh, busy, refused, start }
}
