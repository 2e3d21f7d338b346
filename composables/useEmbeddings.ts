import type { CreateEmbedding, EmbeddingView } from '#shared/schemas/embeddings'
import type { MachineSheet } from '#shared/schemas/machines'
import type { ReturnView } from '#shared/schemas/returns'
import type { ProgrammedView, RunSheetView } from '#shared/schemas/run-sheets'
import type { ChainFindings, EmbeddingChains } from '~/utils/embedding/layers'
import { unpackArrays } from '#shared/packed-arrays'

export const useEmbedding = (id: MaybeRefOrGetter<string>) =>
  useResource<EmbeddingView>(() => `/api/embeddings/${toValue(id)}`)

/** The chains by dense index, loaded in the browser once they are found. */
export function useEmbeddingChains(embedding: MaybeRefOrGetter<EmbeddingView | null | undefined>) {
  const chains = shallowRef<EmbeddingChains | null>(null)
  const failed = ref(false)
  const found = computed(() => {
    const view = toValue(embedding)
    return view?.status === 'found' ? view.id : null
  })
  const load = async (): Promise<void> => {
    const id = found.value
    chains.value = null
    if (!id) return
    try {
      const bytes = await $fetch<ArrayBuffer>(`/api/embeddings/${id}/chains`, { responseType: 'arrayBuffer' })
      const { meta, arrays } = unpackArrays(new Uint8Array(bytes))
      const { labels, ranges } = meta as { labels: string[]; ranges: MachineSheet['ranges'] }
      if (found.value === id) chains.value = markRaw({ ...arrays, labels, ranges } as unknown as EmbeddingChains)
      failed.value = false
    } catch {
      failed.value = true
    }
  }
  onMounted(() => watch(found, load, { immediate: true }))
  return { chains, failed, load }
}

const REPORTED = ['returned', 'closed']

/**
 * What one run sheet on the embedding says about its chains: strengths, programmed values and the newest samples. At
 * first the newest sheet with returned samples, else the newest; `choose` takes another. Samples asked for by their id
 * come before both.
 */
export function useChainFindings(
  embedding: MaybeRefOrGetter<EmbeddingView | null | undefined>,
  askedReturn: string | null,
) {
  const asked = shallowRef<ReturnView | null>(null)
  const findings = shallowRef<ChainFindings | null>(null)
  const chosen = ref<string | null>(null)
  const sheets = computed(() => [...(toValue(embedding)?.runSheets ?? [])].sort((a, b) => b.number - a.number))
  const sheetId = computed(
    () => chosen.value ?? (sheets.value.find(({ state }) => REPORTED.includes(state)) ?? sheets.value[0])?.id ?? null,
  )
  const load = async (): Promise<void> => {
    const id = sheetId.value
    if (!id) return void (findings.value = null)
    const [runSheet, programmed] = await Promise.all([
      $fetch<RunSheetView>(`/api/run-sheets/${id}`).catch(() => null),
      $fetch<ProgrammedView>(`/api/run-sheets/${id}/programmed`).catch(() => null),
    ])
    const ready = runSheet?.returns.filter(({ status }) => status === 'ready').sort((a, b) => b.number - a.number)[0]
    const shown = asked.value?.runSheet.id === id ? asked.value : null
    const samples = shown ?? (ready ? await $fetch<ReturnView>(`/api/returns/${ready.id}`).catch(() => null) : null)
    if (sheetId.value === id) findings.value = runSheet ? markRaw({ runSheet, samples, programmed }) : null
  }
  onMounted(async () => {
    if (askedReturn) asked.value = await $fetch<ReturnView>(`/api/returns/${askedReturn}`).catch(() => null)
    if (asked.value) chosen.value = asked.value.runSheet.id
    watch(sheetId, load, { immediate: true })
  })
  const choose = (id: string): void => void (chosen.value = id)
  return { findings, sheets, sheetId, choose }
}

export function useEmbeddingActions() {
  const api = useApi()
  return {
    start: (input: Partial<CreateEmbedding> & Pick<CreateEmbedding, 'problemId' | 'machineId'>) =>
      api.post<{ id: string; jobId: string }>('/api/embeddings', input),
    importChains: (input: { problemId: string; machineId: string; chains: Record<string, number[]> }) =>
      api.post<{ id: string }>('/api/embeddings/import', input),
  }
}
