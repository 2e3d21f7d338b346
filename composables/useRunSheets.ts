import type { RunSheetComparison } from '#shared/run-sheet-comparison'
import type { Page } from '#shared/schemas/common'
import type { Decoding, ReturnView } from '#shared/schemas/returns'
import type { Outcome } from './useApi'
import type { UploadWatch } from './useUploads'
import type {
  EditRunSheet,
  QuenchSeries,
  Rehearse,
  RunSheetItem,
  RunSheetSettings,
  RunSheetView,
} from '#shared/schemas/run-sheets'

export const useRunSheets = () => useResource<Page<RunSheetItem>>('/api/run-sheets?limit=200')

export const useRunSheet = (id: MaybeRefOrGetter<string>) =>
  useResource<RunSheetView>(() => `/api/run-sheets/${toValue(id)}`)

export const useReturn = (
  id: MaybeRefOrGetter<string>,
  decode: MaybeRefOrGetter<Decoding>,
  feasible: MaybeRefOrGetter<boolean>,
) =>
  useResource<ReturnView>(() => `/api/returns/${toValue(id)}?decode=${toValue(decode)}&feasible=${toValue(feasible)}`)

/** What is said about a file of samples beside its bytes. */
export interface SamplesOptions {
  format?: 'csv' | 'npy' | 'npz' | 'json'
  gauges: 'undone' | 'as read'
  qubitOrder?: string
  machineTimeSeconds?: number
}

export const useRunSheetComparison = (sides: MaybeRefOrGetter<{ a: string; b: string }>) =>
  useResource<RunSheetComparison>(() => `/api/run-sheets/compare?${new URLSearchParams(toValue(sides))}`)

/** Preparing, changing, handing over, rehearsing and returning. */
export function useRunSheetActions() {
  const api = useApi()
  const { load } = useSession()
  /** What it did shows in the rail: in the count of run sheets, or in the machine time. */
  const counted = async <T>(sent: Promise<Outcome<T>>): Promise<Outcome<T>> => {
    const outcome = await sent
    if (outcome.ok) await load()
    return outcome
  }
  return {
    create: (input: { embeddingId: string } & Partial<RunSheetSettings>) =>
      counted(api.post<{ id: string; number: number }>('/api/run-sheets', input)),
    edit: (id: string, change: EditRunSheet) => api.patch<RunSheetView>(`/api/run-sheets/${id}`, change),
    handOver: (id: string, step: 'submit' | 'approve' | 'send-back' | 'issue', remark: string, byBridge: boolean) =>
      counted(
        api.post<{ state: string }>(`/api/run-sheets/${id}/${step}`, {
          remark,
          ...(step === 'issue' ? { byBridge } : {}),
        }),
      ),
    send: (id: string) => api.post(`/api/run-sheets/${id}/send`),
    remark: (id: string, remark: string) => api.post<{ at: string }>(`/api/run-sheets/${id}/remarks`, { remark }),
    duplicate: (id: string) => counted(api.post<{ id: string; number: number }>(`/api/run-sheets/${id}/duplicate`)),
    quench: (id: string, series: QuenchSeries) =>
      counted(
        api.post<{ items: { id: string; number: number; s: number }[] }>(`/api/run-sheets/${id}/quenches`, series),
      ),
    rehearse: (id: string, input: Partial<Rehearse>) =>
      api.post<{ returnId: string; jobId: string }>(`/api/run-sheets/${id}/rehearsals`, input),
    upload: (id: string, file: File, options: SamplesOptions, watch?: UploadWatch) => {
      const body = new FormData()
      for (const [name, value] of Object.entries(options)) if (value !== undefined) body.append(name, String(value))
      body.append('file', file, file.name)
      return counted(sendForm<{ id: string; reads: number }>(`/api/run-sheets/${id}/returns`, body, watch))
    },
  }
}
