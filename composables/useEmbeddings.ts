import type { CreateEmbedding, EmbeddingView } from '#shared/schemas/embeddings'

export const useEmbedding = (id: MaybeRefOrGetter<string>) =>
  useResource<EmbeddingView>(() => `/api/embeddings/${toValue(id)}`)

export function useEmbeddingActions() {
  const api = useApi()
  return {
    start: (input: Partial<CreateEmbedding> & Pick<CreateEmbedding, 'problemId' | 'machineId'>) =>
      api.post<{ id: string; jobId: string }>('/api/embeddings', input),
    importChains: (input: { problemId: string; machineId: string; chains: Record<string, number[]> }) =>
      api.post<{ id: string }>('/api/embeddings/import', input),
  }
}
