import type { CalibrationSaved } from '#shared/schemas/machines'
import type { ApiFailure } from './useApi'

/** Saving a new calibration of a machine from its page: whether the form is open, what was refused, what was saved. */
export function useCalibrating(machineId: MaybeRefOrGetter<string>, refresh: () => Promise<unknown>) {
  const route = useRoute()
  const { may } = useSession()
  const { calibrate } = useMachineActions()
  const isOpen = ref(false)
  const isBusy = ref(false)
  const refused = shallowRef<ApiFailure | null>(null)
  const saved = shallowRef<CalibrationSaved | null>(null)

  function begin(): void {
    refused.value = null
    saved.value = null
    isOpen.value = true
  }

  /** A link may ask for a new calibration in which more parts are missing: `?calibrate=1&missing=17-42`. */
  const suggested = computed(() => [route.query.missing].flat().filter(Boolean).join(', ').slice(0, 2000))
  watch(
    () => route.query.calibrate,
    (wanted) => wanted && may('steward', 'owner') && begin(),
    { immediate: true },
  )

  function leave(): void {
    isOpen.value = false
    if (route.query.calibrate) void navigateTo({ path: route.path }, { replace: true })
  }

  async function save(body: Record<string, unknown>): Promise<void> {
    isBusy.value = true
    refused.value = null
    const outcome = await calibrate(toValue(machineId), body)
    if (outcome.ok) {
      await refresh()
      saved.value = outcome.value
      leave()
      window.scrollTo({ top: 0 })
    } else refused.value = outcome.failure
    isBusy.value = false
  }

  return { isOpen, isBusy, refused, saved, suggested, begin, leave, save }
}
