import type { GraphFormat } from '#shared/engine/machine/graph-files/graph-file'
import type { UploadedGraph, UploadedMachine } from '#shared/schemas/machine-uploads'
import type { ApiFailure, Outcome } from './useApi'
import type { UploadProgress, UploadWatch } from './useUploads'

/** A graph file that a new machine is to be made of; the format is null where it is to be detected. */
export interface GraphFileDraft {
  file: File | null
  format: GraphFormat | null
}

function send<T>({ file, format }: GraphFileDraft, fields: Record<string, string>, watch?: UploadWatch) {
  const body = new FormData()
  for (const [name, value] of Object.entries(fields)) body.append(name, value)
  if (format) body.append('format', format)
  body.append('file', file!)
  return sendForm<T>('/api/machines', body, watch)
}

/** The sheet travels in a part of the form; its fields are named here as those of a machine of a family are. */
const withoutPart = (failure: ApiFailure): ApiFailure => ({
  ...failure,
  issues: failure.issues.map((issue) => ({ ...issue, path: issue.path?.replace(/^machine\./, '') })),
})

/** Reads a graph file as soon as it is chosen, without saving it; and saves it as a machine when told to. */
export function useGraphUpload(draft: Ref<GraphFileDraft>) {
  const graph = shallowRef<UploadedGraph | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const progress = ref<UploadProgress | null>(null)
  let stopper: AbortController | null = null

  const stop = (): void => stopper?.abort()
  async function read(): Promise<void> {
    stop()
    graph.value = failure.value = progress.value = null
    if (!draft.value.file) return
    const own = (stopper = new AbortController())
    const onProgress = (now: UploadProgress): void => {
      if (own === stopper && !own.signal.aborted) progress.value = now
    }
    progress.value = { step: 'sending', share: 0 }
    const outcome = await send<UploadedGraph>(draft.value, { dryRun: 'true' }, { onProgress, signal: own.signal })
    // Another file may have been chosen meanwhile.
    if (own !== stopper) return
    progress.value = null
    if (outcome.ok) graph.value = outcome.value
    else failure.value = outcome.failure
  }
  const save = async (machine: Record<string, unknown>): Promise<Outcome<UploadedMachine>> => {
    const outcome = await send<UploadedMachine>(draft.value, { machine: JSON.stringify(machine) })
    return outcome.ok ? outcome : { ok: false, failure: withoutPart(outcome.failure) }
  }

  watch(draft, read)
  onBeforeUnmount(stop)
  return { graph, failure, progress, save, stop }
}
