import type { PresolveState, PresolveView } from '#shared/schemas/presolve'
import type { ApiFailure } from './useApi'

const LOOK_MS = 1000

type Fetch = <T>(url: string, options?: { method?: 'POST'; body?: object; signal?: AbortSignal }) => Promise<T>

/** The headline of a pre-solve, fetched once the page is shown; undefined until it is known. */
export function usePresolveState(id: string) {
  return useLazyAsyncData(
    `presolve state ${id}`,
    () => ($fetch as Fetch)<PresolveState>(`/api/problems/${id}/presolve`),
    {
      server: false,
    },
  )
}

/** A pre-solve that is run while the page is open; it ends on the server when the page is left or it is stopped. */
export function usePresolve(id: string) {
  const fetcher = $fetch as Fetch
  const view = shallowRef<PresolveView | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const progress = shallowRef<Extract<PresolveState, { state: 'running' }> | null>(null)
  const isRunning = ref(false)
  const startedAt = ref(0)
  let stopper: AbortController | undefined

  async function look(): Promise<void> {
    const state = await fetcher<PresolveState>(`/api/problems/${id}/presolve`).catch(() => null)
    progress.value = isRunning.value && state?.state === 'running' ? state : null
  }

  async function run(): Promise<void> {
    const mine = (stopper = new AbortController())
    isRunning.value = true
    startedAt.value = Date.now()
    failure.value = null
    const looking = setInterval(() => void look(), LOOK_MS)
    try {
      view.value = await fetcher<PresolveView>(`/api/problems/${id}/presolve`, {
        method: 'POST',
        body: {},
        signal: mine.signal,
      })
    } catch (error) {
      if (!mine.signal.aborted) failure.value = failureOf(error)
    } finally {
      clearInterval(looking)
      isRunning.value = false
      progress.value = null
    }
  }
  const stop = (): void => stopper?.abort()
  onMounted(run)
  onBeforeUnmount(stop)

  const api = useApi()
  const save = () => api.post<{ id: string; number: number; name: string }>(`/api/problems/${id}/reduced`)
  return { view, failure, progress, isRunning, startedAt, run, stop, save }
}
