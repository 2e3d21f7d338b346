import type { UploadedProblem } from '#shared/schemas/problems'
import type { ApiFailure, Outcome } from './useApi'
import type { ProblemUpload } from './useProblems'
import type { UploadWatch } from './useUploads'

/** Time without typing after which the text is read again. */
const PAUSE_MILLISECONDS = 400
/** A file up to this size is shown as text, so that its lines can be seen and mended. */
const SHOWN_BYTES = 1e6

/** The file as text, or null when it is too large to show or no text. */
async function textOf(file: File | null): Promise<string | null> {
  if (!file || file.size > SHOWN_BYTES) return null
  const text = await file.text()
  return /[\0\uFFFD]/.test(text) ? null : text
}

/** What is brought in and where it goes: a new problem, or a new version of one. */
export interface UploadTarget<T extends UploadedProblem> {
  draft: ReturnType<typeof useProblemDraft>
  preview: (upload: ProblemUpload, watch?: UploadWatch) => Promise<Outcome<T>>
  save: (upload: ProblemUpload) => Promise<Outcome<T>>
}

/** A problem that is being brought in. */
export function useNewProblem() {
  const { preview, save } = useProblemActions()
  return useProblemUpload<UploadedProblem>({ draft: useProblemDraft(), preview, save })
}

/** Reads the draft as soon as it changes, without saving it, and saves it when told to. */
export function useProblemUpload<T extends UploadedProblem>({ draft, preview, save }: UploadTarget<T>) {
  const { reading, failure, isReading, progress, upload, readSoon, stop } = useDraftReading(draft, preview)
  const saveFailure = shallowRef<ApiFailure | null>(null)
  const isSaving = ref(false)
  const isDownloading = ref(false)
  const fileText = ref<string | null>(null)

  function changed(delay: number): void {
    saveFailure.value = null
    draft.skipRejected = false
    readSoon(delay)
  }
  async function take(file: File | null): Promise<void> {
    // What was understood of another file says nothing about this one.
    reading.value = null
    changed(0)
    if (file && !draft.name) draft.name = file.name.replace(/\.[^.]*$/, '').slice(0, 120)
    const text = await textOf(file)
    if (draft.file === file) fileText.value = text
  }
  async function commit(): Promise<T | null> {
    const sent = upload()
    if (!sent) return null
    isSaving.value = true
    const outcome = await save(sent)
    isSaving.value = false
    saveFailure.value = outcome.ok ? null : outcome.failure
    return outcome.ok ? outcome.value : null
  }
  async function download(): Promise<void> {
    const sent = upload()
    if (!sent) return
    isDownloading.value = true
    failure.value = await downloadRejected(sent)
    isDownloading.value = false
  }

  watch(
    () => draft.text,
    () => draft.file ?? changed(PAUSE_MILLISECONDS),
  )
  watch(
    () => draft.options,
    () => changed(PAUSE_MILLISECONDS / 2),
    { deep: true },
  )
  watch(() => draft.file, take)
  onMounted(() => draft.isEmpty || take(draft.file))

  const again = (): void => changed(0)
  const shown = { reading, failure, saveFailure, isReading, isSaving, isDownloading, fileText, progress }
  return { draft, ...shown, commit, download, stop, again }
}
