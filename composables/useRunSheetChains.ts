import { unpackArrays } from '#shared/packed-arrays'
import type { ChainRow, RunSheetView } from '#shared/schemas/run-sheets'
import { unpackChainRows } from '~/utils/run-sheet/chains'

/** The chains of a run sheet with strengths and bounds. Packed: a large problem has tens of thousands of them. */
export async function fetchRunSheetChains(id: string): Promise<ChainRow[]> {
  const bytes = await $fetch<ArrayBuffer>(`/api/run-sheets/${id}/chains`, { responseType: 'arrayBuffer' })
  return markRaw(unpackChainRows(unpackArrays(new Uint8Array(bytes))))
}

/** The same for the run sheet on the page, again with every other one and whenever it is saved. */
export function useRunSheetChains(sheet: () => RunSheetView | undefined) {
  const late = useLateLoad(async () => {
    const id = sheet()?.id
    return id ? fetchRunSheetChains(id) : []
  })
  onMounted(() => watch(() => [sheet()?.id, sheet()?.changedAt], late.load, { immediate: true }))
  return { ...late, chains: computed<readonly ChainRow[]>(() => late.data.value ?? []) }
}
