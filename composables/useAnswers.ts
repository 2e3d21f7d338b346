import type { AnswerPage, SharedAnswer, ShareAnswer } from '#shared/schemas/answers'
import type { Decoding } from '#shared/schemas/returns'

/** The answer of a return, with the links to it that stand. */
export const useAnswer = (
  id: MaybeRefOrGetter<string>,
  decode: MaybeRefOrGetter<Decoding>,
  assignments: MaybeRefOrGetter<number>,
) =>
  useResource<AnswerPage>(
    () => `/api/returns/${toValue(id)}/answer-sheet?decode=${toValue(decode)}&assignments=${toValue(assignments)}`,
  )

/** The answer behind a link, for anyone who holds it. */
export const useSharedAnswer = (secret: MaybeRefOrGetter<string>) =>
  useResource<SharedAnswer>(() => `/api/answer-sheets/${toValue(secret)}`)

export function useAnswerActions() {
  const api = useApi()
  return {
    share: (id: string, input: ShareAnswer) =>
      api.post<{ id: string; url: string }>(`/api/returns/${id}/answer-sheet`, input),
    revoke: (id: string) => api.remove<{ revoked: number }>(`/api/returns/${id}/answer-sheet`),
  }
}
