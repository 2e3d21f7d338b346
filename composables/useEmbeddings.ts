import type { CreateEmbedding, EmbeddingView } from '#shared/schemas/embeddings'
import type { MachineSheet } from '#shared/schemas/machines'
import type { Page } from '#shared/schemas/common'
import type { EmbeddingOfProblem, ProblemItem, ProblemView } from '#shared/schemas/problems'
import type { ReturnView } from '#shared/schemas/returns'
import type { ProgrammedView, RunSheetView } from '#shared/schemas/run-sheets'
import type { ChainFindings, EmbeddingChains } from '~/utils/embedding/layers'
import type { StartSettings } from '~/utils/embedding/search'
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

/**
 * The embeddings of the same problem, and the problems that chains may be carried over to, loaded in the browser once
 * the embedding is found. `siblings` is null until it is there.
 */
export function useSiblings(embedding: MaybeRefOrGetter<EmbeddingView | null | undefined>) {
  const siblings = shallowRef<readonly EmbeddingOfProblem[] | null>(null)
  const problems = shallowRef<readonly ProblemItem[]>([])
  const problemId = computed(() => {
    const view = toValue(embedding)
    return view?.status === 'found' ? view.problem.id : null
  })
  const load = async (): Promise<void> => {
    const id = problemId.value
    const problem = id ? await $fetch<ProblemView>(`/api/problems/${id}`).catch(() => null) : null
    if (id === problemId.value) siblings.value = problem?.embeddings ?? null
  }
  const loadProblems = async (): Promise<void> => {
    const page = await $fetch<Page<ProblemItem>>('/api/problems?limit=200').catch(() => null)
    problems.value = page?.items ?? []
  }
  onMounted(() =>
    watch(
      problemId,
      async (id) => {
        await load()
        if (id) await loadProblems()
      },
      { immediate: true },
    ),
  )
  return { siblings, problems, load }
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
    const [runSheet, chains, programmed] = await Promise.all([
      $fetch<RunSheetView>(`/api/run-sheets/${id}`).catch(() => null),
      fetchRunSheetChains(id).catch(() => []),
      $fetch<ProgrammedView>(`/api/run-sheets/${id}/programmed`).catch(() => null),
    ])
    const ready = runSheet?.returns.filter(({ status }) => status === 'ready').sort((a, b) => b.number - a.number)[0]
    const shown = asked.value?.runSheet.id === id ? asked.value : null
    const samples = shown ?? (ready ? await $fetch<ReturnView>(`/api/returns/${ready.id}`).catch(() => null) : null)
    if (sheetId.value === id) findings.value = runSheet ? markRaw({ runSheet, chains, samples, programmed }) : null
  }
  onMounted(async () => {
    if (askedReturn) asked.value = await $fetch<ReturnView>(`/api/returns/${askedReturn}`).catch(() => null)
    if (asked.value) chosen.value = asked.value.runSheet.id
    watch(sheetId, load, { immediate: true })
  })
  const choose = (id: string): void => void (chosen.value = id)
  return { findings, sheets, sheetId, choose }
}

type NewEmbedding = Partial<CreateEmbedding> & Pick<CreateEmbedding, 'problemId' | 'machineId'>

export function useEmbeddingActions() {
  const api = useApi()
  const start = (input: NewEmbedding) => api.post<{ id: string; jobId: string }>('/api/embeddings', input)
  return {
    start,
    /** A new embedding made from one that is there, at the calibration in force. */
    startFrom: ({ id, machine, objective }: EmbeddingView, seed: number, settings: StartSettings) => {
      const { problemId, work, frozen, timeLimitSeconds } = settings
      const from = { embeddingId: id, work, frozen }
      return start({ problemId, machineId: machine.id, seed, objective, timeLimitSeconds, start: from })
    },
    choose: (id: string, chosen: boolean) => api.patch<EmbeddingView>(`/api/embeddings/${id}`, { chosen }),
    importChains: (input: { problemId: string; machineId: string; chains: Record<string, number[]> }) =>
      api.post<{ id: string }>('/api/embeddings/import', input),
    /** Chains edited by hand as an embedding of their own, at the calibration in force; by label, with qubit numbers. */
    saveEdited: ({ id, problem, machine }: EmbeddingView, chains: Record<string, number[]>) =>
      api.post<{ id: string }>('/api/embeddings/import', {
        problemId: problem.id,
        machineId: machine.id,
        editedFrom: id,
        chains,
      }),
  }
}
