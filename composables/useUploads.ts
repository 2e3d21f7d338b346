import { workspaceHeaders } from '~/utils/team/shownWorkspace'
import type { ApiFailure, Outcome } from './useApi'

/** How far an upload is: bytes on their way, or bytes read of those that arrived. */
export interface UploadProgress {
  step: 'sending' | 'reading'
  /** Share done, 0 … 1; null while it cannot be told. */
  share: number | null
}

export interface UploadWatch {
  onProgress?: (progress: UploadProgress) => void
  signal?: AbortSignal
}

/** A line of the answer, see server/utils/progress.ts. */
interface AnswerLine<T> {
  progress?: { bytes: number; of: number }
  done?: T
  failed?: { statusCode: number; data?: Partial<ApiFailure> }
}

const STOPPED: ApiFailure = { status: 0, code: 'stopped', message: 'Stopped before it was read.', issues: [] }

/** An answer that was refused before any work began is the usual error object. */
function refusal(request: XMLHttpRequest): ApiFailure {
  try {
    return failureOf({ statusCode: request.status, data: JSON.parse(request.responseText) })
  } catch {
    return failureOf({ statusCode: request.status })
  }
}

/** Sends a form with a file, and tells how far sending and reading are. Needs a browser. */
export function sendForm<T>(url: string, body: FormData, watch: UploadWatch = {}): Promise<Outcome<T>> {
  return new Promise((resolve) => {
    const request = new XMLHttpRequest()
    let outcome: Outcome<T> | undefined
    let taken = 0
    const fail = (failure: ApiFailure): void => resolve({ ok: false, failure })
    const take = ({ progress, done, failed }: AnswerLine<T>): void => {
      if (progress)
        watch.onProgress?.({ step: 'reading', share: progress.of > 0 ? progress.bytes / progress.of : null })
      if (done !== undefined) outcome = { ok: true, value: done }
      if (failed)
        outcome = { ok: false, failure: failureOf({ statusCode: failed.statusCode, data: { data: failed.data } }) }
    }
    const takeLines = (): void => {
      if (request.status !== 200) return
      for (let end; (end = request.responseText.indexOf('\n', taken)) >= 0; taken = end + 1)
        take(JSON.parse(request.responseText.slice(taken, end)) as AnswerLine<T>)
    }
    request.upload.onprogress = ({ loaded, total }) =>
      watch.onProgress?.(loaded < total ? { step: 'sending', share: loaded / total } : { step: 'reading', share: null })
    request.onprogress = takeLines
    request.onload = () => {
      takeLines()
      if (outcome) resolve(outcome)
      else fail(request.status === 200 ? failureOf(null) : refusal(request))
    }
    request.onerror = () => fail(failureOf(null))
    request.onabort = () => fail(STOPPED)
    watch.signal?.addEventListener('abort', () => request.abort())
    request.open('POST', url)
    request.setRequestHeader('accept', 'application/x-ndjson, application/json')
    for (const [name, value] of Object.entries(workspaceHeaders())) request.setRequestHeader(name, value)
    request.send(body)
  })
}

/** Saves bytes as a file of the person's. */
export function saveAs(name: string, bytes: Blob): void {
  const link = document.createElement('a')
  link.href = URL.createObjectURL(bytes)
  link.download = name
  link.click()
  URL.revokeObjectURL(link.href)
}
