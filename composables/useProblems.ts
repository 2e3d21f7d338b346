import type { Page } from '#shared/schemas/common'
import type { ProblemItem, ProblemView, TermsView, UploadedProblem } from '#shared/schemas/problems'

export const useProblems = () => useResource<Page<ProblemItem>>('/api/problems?limit=200')

export const useProblem = (id: MaybeRefOrGetter<string>) =>
  useResource<ProblemView>(() => `/api/problems/${toValue(id)}`)

/** A part of the coefficients in both forms. */
export const useTerms = (id: string, part: TermsView['part'], limit: MaybeRefOrGetter<number>) =>
  useResource<TermsView>(() => `/api/problems/${id}/terms?part=${part}&limit=${toValue(limit)}`)

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

/** Uploading, renaming and deleting problems. */
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
    remove: (id: string) => api.remove(`/api/problems/${id}`),
  }
}
