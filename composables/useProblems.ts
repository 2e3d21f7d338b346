import type { Page } from '#shared/schemas/common'
import type { ApiFailure } from './useApi'
import type { ProblemItem, ProblemView, TermsView, UploadedProblem } from '#shared/schemas/problems'

const LIST = '/api/problems?limit=200'

/** The newest 200 problems, and as many more each time they are asked for. */
export async function useProblems() {
  const { data, failure, refresh, status } = await useResource<Page<ProblemItem>>(LIST)
  const later = useLaterPages<ProblemItem>(data, (cursor) => `${LIST}&cursor=${encodeURIComponent(cursor)}`)
  return { ...later, failure, refresh, status, loaded: computed(() => data.value !== undefined) }
}

export const useProblem = (id: MaybeRefOrGetter<string>) =>
  useResource<ProblemView>(() => `/api/problems/${toValue(id)}`)

const FIRST_TERMS = { linear: 6, interactions: 8 } as const
/** What one request may bring. */
const MOST_TERMS = 500

/** The coefficients in both forms: the first few, and more each time they are asked for. */
export async function useTerms(id: string, part: TermsView['part']) {
  const address = (start: number, limit: number) =>
    `/api/problems/${id}/terms?part=${part}&start=${start}&limit=${limit}`
  const { data: first, failure, refresh } = await useResource<TermsView>(address(0, FIRST_TERMS[part]))
  const grown = shallowRef<{ from?: TermsView; terms?: TermsView }>({})
  const moreFailure = shallowRef<ApiFailure | null>(null)
  const terms = computed(() => (grown.value.from === first.value ? grown.value.terms : undefined) ?? first.value)

  const more = async (): Promise<void> => {
    const shown = terms.value
    if (!shown) return
    const start = shown[part].length
    try {
      const next = await $fetch<TermsView>(address(start, Math.min(MOST_TERMS, Math.max(50, start))))
      const linear = [...shown.linear, ...next.linear]
      const interactions = [...shown.interactions, ...next.interactions]
      grown.value = { from: first.value, terms: { ...shown, linear, interactions } }
      moreFailure.value = null
    } catch (error) {
      moreFailure.value = failureOf(error)
    }
  }
  return { terms, failure: computed(() => failure.value ?? moreFailure.value), refresh, more }
}

export interface ProblemUpload {
  file: File
  name: string
  /** Empty: as the file says, or detected. */
  form: string
  format: string
  convention: string
  sense: string
  skipRejected: boolean
}

/** Uploading and renaming problems. */
export function useProblemActions() {
  const api = useApi()
  const form = (upload: ProblemUpload, dryRun: boolean): FormData => {
    const body = new FormData()
    const { file, skipRejected, ...fields } = upload
    for (const [name, value] of Object.entries(fields)) if (value) body.append(name, value)
    if (skipRejected) body.append('skipRejected', 'true')
    if (dryRun) body.append('dryRun', 'true')
    body.append('file', file, file.name)
    return body
  }
  return {
    preview: (upload: ProblemUpload) => api.post<UploadedProblem>('/api/problems', form(upload, true)),
    save: (upload: ProblemUpload) => api.post<UploadedProblem>('/api/problems', form(upload, false)),
    edit: (id: string, change: { name?: string; note?: string }) => api.patch(`/api/problems/${id}`, change),
  }
}
