import type { ApiFailure, Outcome } from './useApi'
import type { UploadWatch } from './useUploads'
import type { UploadedVersion } from '#shared/schemas/problem-versions'
import type { ProblemView, TermsView, UploadedProblem } from '#shared/schemas/problems'

/** `?version=3`, or nothing for the current one. */
const versionPart = (version: number | null): string => (version === null ? '' : `?version=${version}`)

/** A problem at one of its versions; null is the current one. */
export const useProblem = (id: MaybeRefOrGetter<string>, version: MaybeRefOrGetter<number | null> = null) =>
  useResource<ProblemView>(() => `/api/problems/${toValue(id)}${versionPart(toValue(version))}`)

const FIRST_TERMS = { linear: 6, interactions: 8 } as const
/** What one request may bring. */
const MOST_TERMS = 500

/** The coefficients in both forms: the first few, and more each time they are asked for. */
export async function useTerms(id: string, part: TermsView['part'], version: MaybeRefOrGetter<number | null> = null) {
  const address = (start: number, limit: number) => {
    const shown = toValue(version)
    const of = shown === null ? '' : `&version=${shown}`
    return `/api/problems/${id}/terms?part=${part}&start=${start}&limit=${limit}${of}`
  }
  const { data: first, failure, refresh } = await useResource<TermsView>(() => address(0, FIRST_TERMS[part]))
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
  /** What the server called the file when it kept it; sent in its place. */
  kept: string | null
  name: string
  /** Empty: as the file says, or detected. */
  form: string
  format: string
  convention: string
  sense: string
  skipRejected: boolean
}

function formOf(upload: ProblemUpload, dryRun: boolean): FormData {
  const body = new FormData()
  const { file, kept, skipRejected, ...fields } = upload
  for (const [name, value] of Object.entries(fields)) if (value) body.append(name, value)
  if (skipRejected) body.append('skipRejected', 'true')
  if (dryRun) body.append('dryRun', 'true')
  if (kept) body.append('kept', kept)
  else body.append('file', file, file.name)
  return body
}

/** Sends an upload by the name that the server kept the file under, and the file itself where it is gone. */
async function deliver<T>(
  url: string,
  upload: ProblemUpload,
  dryRun: boolean,
  watch?: UploadWatch,
): Promise<Outcome<T>> {
  const outcome = await sendForm<T>(url, formOf(upload, dryRun), watch)
  if (outcome.ok || !upload.kept || outcome.failure.code !== 'problem.file-gone') return outcome
  return sendForm<T>(url, formOf({ ...upload, kept: null }, dryRun), watch)
}

/** Uploading a new version of a problem, with what it is for. */
export function useVersionActions(id: string) {
  const send = (
    { name: _name, ...upload }: ProblemUpload & { remark?: string },
    dryRun: boolean,
    watch?: UploadWatch,
  ) => deliver<UploadedVersion>(`/api/problems/${id}/versions`, upload as ProblemUpload, dryRun, watch)
  return {
    preview: (upload: ProblemUpload, watch?: UploadWatch) => send(upload, true, watch),
    save: (upload: ProblemUpload, remark: string) => send({ ...upload, remark }, false),
  }
}

/** Uploading, renaming, filing and copying problems. */
export function useProblemActions() {
  const api = useApi()
  return {
    preview: (upload: ProblemUpload, watch?: UploadWatch) =>
      deliver<UploadedProblem>('/api/problems', upload, true, watch),
    save: (upload: ProblemUpload) => deliver<UploadedProblem>('/api/problems', upload, false),
    edit: (id: string, change: { name?: string; note?: string }) => api.patch(`/api/problems/${id}`, change),
    tag: (id: string, tags: { add?: string[]; remove?: string[] }) => api.patch(`/api/problems/${id}`, { tags }),
    duplicate: (id: string, version: number) =>
      api.post<{ id: string; number: number }>(`/api/problems/${id}/duplicate`, { version }),
    relabel: (id: string, version: number, renames: { from: string; to: string }[]) =>
      api.post<{ version: number }>(`/api/problems/${id}/labels`, { version, renames }),
  }
}

/** Saves all lines of an upload that cannot be read as a file of the person's; answers why it could not. */
export async function downloadRejected(upload: ProblemUpload): Promise<ApiFailure | null> {
  const request = (body: FormData) =>
    $fetch<Blob>('/api/problems/rejected', { method: 'POST', body, responseType: 'blob' })
  try {
    const bytes = await request(formOf(upload, true)).catch(() => request(formOf({ ...upload, kept: null }, true)))
    saveAs(`${upload.file.name.replace(/\.[^.]*$/, '')}-rejected.csv`, bytes)
    return null
  } catch (error) {
    return failureOf(error)
  }
}
