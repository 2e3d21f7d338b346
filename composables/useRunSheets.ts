import type { Page } from '#shared/schemas/common'
import type { Decoding, ReturnView } from '#shared/schemas/returns'
import type { EditRunSheet, Rehearse, RunSheetItem, RunSheetSettings, RunSheetView } from '#shared/schemas/run-sheets'

export const useRunSheets = () => useResource<Page<RunSheetItem>>('/api/run-sheets?limit=200')

export const useRunSheet = (id: MaybeRefOrGetter<string>) =>
  useResource<RunSheetView>(() => `/api/run-sheets/${toValue(id)}`)

export const useReturn = (id: MaybeRefOrGetter<string>, decode: MaybeRefOrGetter<Decoding>) =>
  useResource<ReturnView>(() => `/api/returns/${toValue(id)}?decode=${toValue(decode)}`)

/** Preparing, changing, handing over, rehearsing and returning. */
export function useRunSheetActions() {
  const api = useApi()
  return {
    create: (input: { embeddingId: string } & Partial<RunSheetSettings>) =>
      api.post<{ id: string; number: number }>('/api/run-sheets', input),
    edit: (id: string, change: EditRunSheet) => api.patch<RunSheetView>(`/api/run-sheets/${id}`, change),
    handOver: (id: string, step: 'submit' | 'approve' | 'send-back' | 'issue', remark: string) =>
      api.post<{ state: string }>(`/api/run-sheets/${id}/${step}`, { remark }),
    rehearse: (id: string, input: Partial<Rehearse>) =>
      api.post<{ returnId: string; jobId: string }>(`/api/run-sheets/${id}/rehearsals`, input),
    upload: (id: string, file: File, machineTimeSeconds: number | null = null) => {
      const body = new FormData()
      if (machineTimeSeconds !== null) body.append('machineTimeSeconds', String(machineTimeSeconds))
      body.append('file', file, file.name)
      return api.post<{ id: string; reads: number }>(`/api/run-sheets/${id}/returns`, body)
    },
  }
}
