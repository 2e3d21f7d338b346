import type { ApiFailure } from './useApi'

/** Loads one thing in the browser; of several answers under way only the last one asked for counts. */
export function useLateLoad<T>(fetcher: () => Promise<T>) {
  const data = shallowRef<T | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const isLoading = ref(false)
  let asked = 0
  const load = async (): Promise<void> => {
    const turn = ++asked
    isLoading.value = true
    failure.value = null
    try {
      const loaded = await fetcher()
      if (turn === asked) data.value = loaded
    } catch (error) {
      if (turn === asked) failure.value = failureOf(error)
    }
    if (turn === asked) isLoading.value = false
  }
  return { data, failure, isLoading, load }
}
