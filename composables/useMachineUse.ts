import type { CapacityCard, MachineBreaks, MachineUse, MeasureCapacity } from '#shared/schemas/machine-use'
import type { ApiFailure } from './useApi'

const at = (calibration: MaybeRefOrGetter<number | undefined>): string =>
  toValue(calibration) === undefined ? '' : `?calibration=${toValue(calibration)}`

/** The embeddings that stand on a machine at a calibration. */
export const useMachineUse = (machineId: MaybeRefOrGetter<string>, calibration: MaybeRefOrGetter<number | undefined>) =>
  useWholeList<MachineUse>(() => `/api/machines/${toValue(machineId)}/use${at(calibration)}`)

/** What is known of a machine's room, and how a measurement of the longest chains is begun. */
export async function useCapacityCard(
  machineId: MaybeRefOrGetter<string>,
  calibration: MaybeRefOrGetter<number | undefined>,
) {
  const api = useApi()
  const { data, failure, refresh } = await useResource<CapacityCard>(
    () => `/api/machines/${toValue(machineId)}/capacity-card${at(calibration)}`,
  )
  const busy = ref(false)
  const refused = shallowRef<ApiFailure | null>(null)

  async function measure(settings: Partial<MeasureCapacity>): Promise<void> {
    busy.value = true
    const outcome = await api.post<{ jobId: string }>(`/api/machines/${toValue(machineId)}/capacity`, {
      ...settings,
      calibration: toValue(calibration),
    })
    refused.value = outcome.ok ? null : outcome.failure
    await refresh()
    busy.value = false
  }
  return { card: data, failure, refresh, busy, refused, measure }
}

/** Breaks by part of a machine, counted on the server when first asked for: loaded once the page is there. */
export function useMachineBreaks(query: MaybeRefOrGetter<{ id: string; calibration: number; rehearsals: boolean }>) {
  const breaks = shallowRef<MachineBreaks | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const url = computed(() => {
    const { id, calibration, rehearsals } = toValue(query)
    return `/api/machines/${id}/breaks?calibration=${calibration}&rehearsals=${rehearsals}`
  })
  const load = async (): Promise<void> => {
    const asked = url.value
    breaks.value = failure.value = null
    try {
      const answer = await $fetch<MachineBreaks>(asked)
      if (asked === url.value) breaks.value = markRaw(answer)
    } catch (error) {
      if (asked === url.value) failure.value = failureOf(error)
    }
  }
  onMounted(() => watch(url, load, { immediate: true }))
  return { breaks, failure, load, csv: computed(() => `${url.value}&format=csv`) }
}
