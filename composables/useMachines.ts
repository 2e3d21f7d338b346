import type { Page } from '#shared/schemas/common'
import type { CalibrationSaved, MachineItem, MachineView } from '#shared/schemas/machines'
import { unpackArrays } from '#shared/packed-arrays'

export const useMachines = () => useResource<Page<MachineItem>>('/api/machines?limit=200')

export const useMachine = (id: MaybeRefOrGetter<string>) =>
  useResource<MachineView>(() => `/api/machines/${toValue(id)}`)

/** Typed arrays of the lattice view; see GET /api/machines/:id/lattice. */
export interface LatticeArrays {
  ids: Uint32Array
  segments: Float32Array
  usable: Uint8Array
  ends: Uint32Array
  places: Float32Array
  missingCouplers: Uint32Array
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

/** Adding and recalibrating machines. */
export function useMachineActions() {
  const api = useApi()
  return {
    create: (body: Record<string, unknown>) => api.post<{ id: string }>('/api/machines', body),
    calibrate: (id: string, body: Record<string, unknown>) =>
      api.post<CalibrationSaved>(`/api/machines/${id}/calibrations`, body),
  }
}
