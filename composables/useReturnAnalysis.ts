import type { AnalysisView, NextDraft, NextDraftView } from '#shared/schemas/return-analysis'
import type { Decoding } from '#shared/schemas/returns'
import type { ApiFailure } from './useApi'

type Chosen = NextDraft['items']

/** The analysis of a return, fetched once the page is there, and the next draft that its advice leads to. */
export function useReturnAnalysis(id: MaybeRefOrGetter<string>, decode: MaybeRefOrGetter<Decoding>) {
  const api = useApi()
  const { load } = useSession()
  const gap = ref(0)
  const url = computed(() => `/api/returns/${toValue(id)}/analysis?decode=${toValue(decode)}&gap=${gap.value}`)
  const { data, error, status, refresh } = useAsyncData(
    url,
    () => ($fetch as (url: string) => Promise<AnalysisView>)(url.value),
    {
      server: false,
      lazy: true,
    },
  )
  /** The last answer stays while the next one is worked out. */
  const analysis = shallowRef<AnalysisView>()
  watch(data, (next) => next && (analysis.value = next as AnalysisView), { immediate: true })
  const failure = computed(() => (error.value ? failureOf(error.value) : null))

  const next = shallowRef<NextDraftView | null>(null)
  const draftFailure = shallowRef<ApiFailure | null>(null)
  const isDrafting = ref(false)
  const post = async (items: Chosen, dryRun: boolean): Promise<NextDraftView | null> => {
    draftFailure.value = null
    const body = { items, decode: toValue(decode), gap: gap.value, dryRun }
    const answer = await api.post<NextDraftView>(`/api/returns/${toValue(id)}/next`, body)
    if (!answer.ok) draftFailure.value = answer.failure
    return answer.ok ? answer.value : null
  }
  /** What the chosen advice would change; a later choice overtakes an earlier one. */
  let asked = 0
  const preview = async (items: Chosen): Promise<void> => {
    const mine = ++asked
    const found = items.length > 0 ? await post(items, true) : null
    if (mine === asked) next.value = found
  }
  const make = async (items: Chosen): Promise<NextDraftView | null> => {
    isDrafting.value = true
    const made = await post(items, false)
    if (made) await load()
    isDrafting.value = false
    return made
  }
  return { analysis, gap, failure, status, refresh, next, draftFailure, isDrafting, preview, make }
}
