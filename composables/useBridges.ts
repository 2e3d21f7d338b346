import type { BridgeSaved, BridgeSecret, BridgeTest, MachineBridgeView, SaveBridge } from '#shared/schemas/bridges'
import type { ApiFailure, Outcome } from './useApi'

/** The bridge of a machine, with what can be done to it: one thing at a time, and what went wrong with the last. */
export async function useBridge(machineId: MaybeRefOrGetter<string>) {
  const url = computed(() => `/api/machines/${toValue(machineId)}/bridge`)
  const resource = await useResource<MachineBridgeView>(url)
  const api = useApi()
  const busy = ref<'save' | 'renew' | 'remove' | 'test' | null>(null)
  const refused = shallowRef<ApiFailure | null>(null)
  /** A secret that was just made, until something else is done. */
  const made = shallowRef<BridgeSecret | null>(null)

  async function act<T>(name: NonNullable<typeof busy.value>, send: () => Promise<Outcome<T>>): Promise<T | null> {
    busy.value = name
    refused.value = null
    made.value = null
    const outcome = await send()
    if (outcome.ok) await resource.refresh()
    else refused.value = outcome.failure
    busy.value = null
    return outcome.ok ? outcome.value : null
  }
  return {
    ...resource,
    busy,
    refused,
    made,
    async save(input: SaveBridge) {
      const saved = await act('save', () => api.put<BridgeSaved>(url.value, input))
      made.value = saved?.made ?? null
    },
    async renew() {
      made.value = await act('renew', () => api.post<BridgeSecret>(`${url.value}/secret`))
    },
    remove: () => act('remove', () => api.remove(url.value)),
    test: () => act('test', () => api.post<BridgeTest>(`${url.value}/test`)),
  }
}
