import type { UploadedProblem } from '#shared/schemas/problems'
import type { ApiFailure, Outcome } from './useApi'
import type { ProblemUpload } from './useProblems'
import type { UploadProgress, UploadWatch } from './useUploads'

/** A file from this size on is waited for with its progress shown. */
const WAITED_BYTES = 1e6

type Draft = ReturnType<typeof useProblemDraft>
type Preview<T> = (upload: ProblemUpload, watch?: UploadWatch) => Promise<Outcome<T>>

/** The file with what was chosen about it; empty fields are left to the file. */
function uploadOf({ name, options, skipRejected }: Draft, file: File, kept: string | null): ProblemUpload {
  const { format, form, convention, sense } = options
  const given = { format: format ?? '', form: form ?? '', convention: convention ?? '', sense: sense ?? '' }
  return { file, kept, name: name.trim(), ...given, skipRejected }
}

/** What the server understands of a draft: read anew whenever it is asked for, only the last answer counts. */
export function useDraftReading<T extends UploadedProblem>(draft: Draft, preview: Preview<T>) {
  const reading = shallowRef<T | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const isReading = ref(false)
  const progress = shallowRef<UploadProgress | null>(null)
  const source = computed(() => {
    if (draft.file) return draft.file
    return draft.text.trim() === '' ? null : new File([draft.text], draft.textName, { type: 'text/plain' })
  })
  let keptFile: { file: File; id: string } | null = null
  let reader: AbortController | undefined
  let turn = 0
  let timer: ReturnType<typeof setTimeout> | undefined

  const upload = (): ProblemUpload | null => {
    const file = source.value
    return file && uploadOf(draft, file, keptFile?.file === file ? keptFile.id : null)
  }
  async function read(): Promise<void> {
    const mine = ++turn
    const sent = upload()
    reader = new AbortController()
    const onProgress = (now: UploadProgress): void => {
      if (mine === turn && sent && sent.file.size > WAITED_BYTES) progress.value = now
    }
    const outcome = sent && (await preview({ ...sent, name: '' }, { onProgress, signal: reader.signal }))
    if (mine !== turn) return
    if (sent && outcome?.ok) keptFile = outcome.value.kept ? { file: sent.file, id: outcome.value.kept } : null
    reading.value = outcome?.ok ? outcome.value : null
    failure.value = outcome && !outcome.ok ? outcome.failure : null
    progress.value = null
    isReading.value = false
  }
  const stop = (): void => reader?.abort()
  function readSoon(delay: number): void {
    clearTimeout(timer)
    turn++
    stop()
    progress.value = null
    isReading.value = source.value !== null
    timer = setTimeout(read, delay)
  }
  onBeforeUnmount(() => {
    clearTimeout(timer)
    turn++
    stop()
  })
  return { reading, failure, isReading, progress, upload, readSoon, stop }
}
