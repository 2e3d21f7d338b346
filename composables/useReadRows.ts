import type { LatticeArrays } from './useMachines'
import type { ChainFindings } from '~/utils/embedding/layers'
import type { ReadRows } from '~/utils/embedding/reads'
import { readRows } from '~/utils/embedding/reads'

/** The samples in view row by row: fetched when somebody first asks for one read, dropped when other samples come. */
export function useReadRows(
  findings: MaybeRefOrGetter<ChainFindings | null>,
  lattice: MaybeRefOrGetter<LatticeArrays>,
) {
  const rows = shallowRef<ReadRows | null>(null)
  const row = ref<number | null>(null)
  const status = ref<'idle' | 'loading' | 'failed'>('idle')
  const returnId = computed(() => toValue(findings)?.samples?.id ?? null)

  const leave = (): void => void (row.value = null)
  watch(returnId, () => {
    leave()
    rows.value = null
  })
  const begin = async (): Promise<void> => {
    const id = returnId.value
    if (!id) return
    if (!rows.value) {
      status.value = 'loading'
      const packed = await $fetch<ArrayBuffer>(`/api/returns/${id}/samples?format=packed`, {
        responseType: 'arrayBuffer',
      }).catch(() => null)
      if (returnId.value !== id) return
      rows.value = packed ? readRows(new Uint8Array(packed), toValue(lattice)) : null
    }
    status.value = rows.value ? 'idle' : 'failed'
    if (rows.value) row.value = 0
  }
  const step = (by: number): void => {
    const count = rows.value?.samples.rows ?? 0
    if (row.value !== null && count > 0) row.value = (row.value + by + count) % count
  }
  return { rows, row, status, begin, step, leave }
}
