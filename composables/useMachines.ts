import type { Page } from '#shared/schemas/common'
import type {
  CalibrationComparison,
  CalibrationSaved,
  MachineCapacity,
  MachineItem,
  MachineView,
} from '#shared/schemas/machines'
import { unpackArrays } from '#shared/packed-arrays'
import type { ApiFailure } from './useApi'

export const useMachines = () => useResource<Page<MachineItem>>('/api/machines?limit=200')

/** A machine at a calibration; without a number, at the one in force. */
export const useMachine = (id: MaybeRefOrGetter<string>, calibration?: MaybeRefOrGetter<string | undefined>) =>
  useResource<MachineView>(() => {
    const number = toValue(calibration)
    const query = number === undefined ? '' : `?calibration=${encodeURIComponent(number)}`
    return `/api/machines/${toValue(id)}${query}`
  })

/** What differs between two calibrations of a machine. */
export const useCalibrationComparison = (
  id: MaybeRefOrGetter<string>,
  numbers: MaybeRefOrGetter<{ from: number; to: number }>,
) =>
  useResource<CalibrationComparison>(() => {
    const { from, to } = toValue(numbers)
    return `/api/machines/${toValue(id)}/calibrations/compare?from=${from}&to=${to}`
  })

/** Typed arrays of the lattice view; see GET /api/machines/:id/lattice. */
export interface LatticeArrays {
  ids: Uint32Array
  segments: Float32Array
  usable: Uint8Array
  ends: Uint32Array
  places: Float32Array
  missingCouplers: Uint32Array
  /** Qubit pairs whose coupler cannot be used since one of the two is missing. */
  couplersOfMissing: Uint32Array
}

/** The machine's geometry at a calibration, loaded in the browser only. */
export function useLattice(machineId: MaybeRefOrGetter<string>, calibration: MaybeRefOrGetter<number | undefined>) {
  const lattice = shallowRef<LatticeArrays | null>(null)
  const failed = ref(false)
  const load = async (): Promise<void> => {
    const query = toValue(calibration) === undefined ? '' : `?calibration=${toValue(calibration)}`
    try {
      const bytes = await $fetch<ArrayBuffer>(`/api/machines/${toValue(machineId)}/lattice${query}`, {
        responseType: 'arrayBuffer',
      })
      lattice.value = markRaw(unpackArrays(new Uint8Array(bytes)).arrays as unknown as LatticeArrays)
      failed.value = false
    } catch {
      failed.value = true
    }
  }
  onMounted(() => watch([() => toValue(machineId), () => toValue(calibration)], load, { immediate: true }))
  return { lattice, failed, load }
}

/** What the machine holds at a calibration, worked out on request; forgotten when either changes. */
export function useMachineCapacity(
  machineId: MaybeRefOrGetter<string>,
  calibration: MaybeRefOrGetter<number | undefined>,
) {
  const capacity = shallowRef<MachineCapacity | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const busy = ref(false)
  const url = computed(() => `/api/machines/${toValue(machineId)}/capacity?calibration=${toValue(calibration)}`)
  watch(url, () => {
    capacity.value = failure.value = null
    busy.value = false
  })
  const workOut = async (): Promise<void> => {
    const asked = url.value
    busy.value = true
    failure.value = null
    try {
      const answer = await $fetch<MachineCapacity>(asked)
      if (asked === url.value) capacity.value = answer
    } catch (error) {
      if (asked === url.value) failure.value = failureOf(error)
    }
    if (asked === url.value) busy.value = false
  }
  return { capacity, failure, busy, workOut }
}

/** Adding and recalibrating machines. */
export function useMachineActions() {
  const api = useApi()
  return {
    create: (body: Record<string, unknown>) => api.post<{ id: string }>('/api/machines', body),
    calibrate: (id: string, body: Record<string, unknown>) =>
      api.post<CalibrationSaved>(`/api/machines/${id}/calibrations`, body),
  }
}
