import type { PrecisionView } from '#shared/schemas/precision'
import type { RunSheetView } from '#shared/schemas/run-sheets'

/**
 * What control error does to the values that a run sheet programmes: worked out by the server on its own, so that the
 * page need not wait for it, and again whenever other values are programmed.
 */
export function usePrecision(sheet: () => RunSheetView) {
  const late = useLateLoad(() => $fetch<PrecisionView>(`/api/run-sheets/${sheet().id}/precision`))
  onMounted(() => watch(() => [sheet().id, sheet().fingerprints.programmed], late.load, { immediate: true }))
  return late
}
