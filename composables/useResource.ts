import type { ApiFailure } from './useApi'

/** Loads one thing from the server, during rendering on the server too; `failure` says what went wrong. */
export async function useResource<T>(url: MaybeRefOrGetter<string>) {
  const fetcher = useRequestFetch()
  const address = computed(() => toValue(url))
  const { data, error, refresh, status } = await useAsyncData<T>(address, () => fetcher<T>(address.value))
  const failure = computed<ApiFailure | null>(() => (error.value ? failureOf(error.value) : null))
  return { data, failure, refresh, status }
}
