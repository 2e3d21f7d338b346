import type { RunSheetScans, ScanRequest } from '#shared/schemas/scans'
import { wholeList } from '~/utils/ui/wholeList'
import type { ApiFailure } from './useApi'

/** The strength scans of a run sheet, loaded in the browser only: few look at them each time. */
export function useScans(runSheetId: MaybeRefOrGetter<string>) {
  const api = useApi()
  const scans = shallowRef<RunSheetScans | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const isStarting = ref(false)
  const address = () => `/api/run-sheets/${toValue(runSheetId)}/scans`

  async function load(): Promise<void> {
    try {
      scans.value = await wholeList(address(), (page) => $fetch<RunSheetScans>(page))
      failure.value = null
    } catch (error) {
      failure.value = failureOf(error)
    }
  }
  /** Starts a scan of the run sheet as it is saved; true when it is under way. */
  async function start(input: ScanRequest): Promise<boolean> {
    isStarting.value = true
    const outcome = await api.post<{ id: string; jobId: string }>(address(), input)
    isStarting.value = false
    failure.value = outcome.ok ? null : outcome.failure
    if (outcome.ok) await load()
    return outcome.ok
  }
  onMounted(() => watch(() => toValue(runSheetId), load, { immediate: true }))
  // Points come in one by one while a scan runs.
  useRefreshWhile(() => scans.value?.items.some(({ status }) => status === 'running') ?? false, load)
  return { scans, failure, isStarting, load, start }
}
