import { unpackArrays } from '#shared/packed-arrays'
import type { ApiFailure } from './useApi'
import type { ProblemGraph } from '~/utils/problem/graph'

/** Variables, interactions and coefficients of a problem, loaded in the browser once they are asked for. */
export function useProblemGraph(problemId: MaybeRefOrGetter<string>, version: MaybeRefOrGetter<number>) {
  const graph = shallowRef<ProblemGraph | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const load = async (): Promise<void> => {
    const [id, shown] = [toValue(problemId), toValue(version)]
    failure.value = null
    try {
      const bytes = await $fetch<ArrayBuffer>(`/api/problems/${id}/graph?version=${shown}`, {
        responseType: 'arrayBuffer',
      })
      const { meta, arrays } = unpackArrays(new Uint8Array(bytes))
      if (id !== toValue(problemId) || shown !== toValue(version)) return
      graph.value = markRaw({ ...arrays, ...meta } as unknown as ProblemGraph)
    } catch (error) {
      failure.value = failureOf(error)
    }
  }
  return { graph, failure, load }
}
