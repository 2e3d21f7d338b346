import { workspaceHeaders } from '~/utils/team/shownWorkspace'
import type { ApiFailure } from './useApi'

/** One thing loaded from the server. */
export interface Resource<T> {
  data: Ref<T | undefined>
  /** What went wrong, while there is nothing newer. */
  failure: ComputedRef<ApiFailure | null>
  status: Ref<'idle' | 'pending' | 'success' | 'error'>
  refresh: () => Promise<void>
}

type ReadOne<T> = (address: string) => Promise<T>

/**
 * Loads one thing from the server, during rendering on the server too.
 * @param readAll loads what takes several requests
 */
export async function useResource<T>(
  url: MaybeRefOrGetter<string>,
  readAll: (address: string, readOne: ReadOne<T>) => Promise<T> = (address, readOne) => readOne(address),
): Promise<Resource<T>> {
  const fetcher = useRequestFetch() as (url: string, options: { headers: Record<string, string> }) => Promise<T>
  const address = computed(() => toValue(url))
  const { data, error, refresh, status } = await useAsyncData(address, () =>
    readAll(address.value, (one) => fetcher(one, { headers: workspaceHeaders() })),
  )
  const failure = computed<ApiFailure | null>(() => (error.value ? failureOf(error.value) : null))
  return { data: data as Ref<T | undefined>, failure, status, refresh: () => refresh() }
}
