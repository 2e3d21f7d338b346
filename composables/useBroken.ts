import type { BrokenList, BrokenView, RepairsStarted } from '#shared/schemas/repairs'
import type { ApiFailure } from './useApi'

/** Starting repairs; `repairing` says who may, whether one is being started, and why one could not be. */
export function useRepairs(machineId: MaybeRefOrGetter<string>, refresh: () => Promise<unknown>) {
  const api = useApi()
  const busy = ref(false)
  const failure = shallowRef<ApiFailure | null>(null)
  const refused = shallowRef<RepairsStarted['refused']>([])
  const repair = async (embeddingIds?: string[]): Promise<void> => {
    busy.value = true
    failure.value = null
    const body = embeddingIds ? { embeddingIds } : {}
    const outcome = await api.post<RepairsStarted>(`/api/machines/${toValue(machineId)}/repairs`, body)
    refused.value = outcome.ok ? outcome.value.refused : []
    if (!outcome.ok) failure.value = outcome.failure
    await refresh()
    busy.value = false
  }
  const { may } = useSession()
  const repairing = computed(() => ({
    mayRepair: may('developer', 'steward', 'owner'),
    busy: busy.value,
    failure: failure.value,
  }))
  return { repairing, refused, repair }
}

/** Embeddings that calibrations of a machine broke. */
export const useBrokenList = (machineId: MaybeRefOrGetter<string>) =>
  useWholeList<BrokenList>(() => `/api/machines/${toValue(machineId)}/broken`)

/** Repairing those of a machine, followed as long as a repair runs: the list and whatever else a repair changes. */
export function useBroken(
  machineId: MaybeRefOrGetter<string>,
  list: Ref<BrokenList | undefined>,
  ...loads: (() => Promise<unknown>)[]
) {
  const refresh = () => Promise.all(loads.map((load) => load()))
  useRefreshWhile(() => list.value?.items.some(({ state }) => state === 'running') ?? false, refresh)
  return useRepairs(machineId, refresh)
}

/** Repairing the one broken embedding of a page, followed as long as that runs. */
export function useBrokenOne(broken: () => BrokenView | null | undefined, refresh: () => Promise<unknown>) {
  useRefreshWhile(() => broken()?.state === 'running', refresh)
  const { repairing, repair } = useRepairs(() => broken()?.machine.id ?? '', refresh)
  return { repairing, repair: () => repair([broken()!.embedding.id]) }
}
