import type { UploadedProblem } from '#shared/schemas/problems'
import type { ApiFailure, Outcome } from './useApi'
import type { ProblemUpload } from './useProblems'

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

type Draft = ReturnType<typeof useProblemDraft>

/** What is brought in and where it goes: a new problem, or a new version of one. */
export interface UploadTarget<T extends UploadedProblem> {
  draft: Draft
  preview: (upload: ProblemUpload) => Promise<Outcome<T>>
  save: (upload: ProblemUpload) => Promise<Outcome<T>>
}

/** The file with what was chosen about it; empty fields are left to the file. */
function uploadOf({ name, options, skipRejected }: Draft, file: File): ProblemUpload {
  const { format, form, convention, sense } = options
  const given = { format: format ?? '', form: form ?? '', convention: convention ?? '', sense: sense ?? '' }
  return { file, name: name.trim(), ...given, skipRejected }
}

/** A problem that is being brought in. */
export function useNewProblem() {
  const { preview, save } = useProblemActions()
  return useProblemUpload<UploadedProblem>({ draft: useProblemDraft(), preview, save })
}

/** Reads the draft as soon as it changes, without saving it, and saves it when told to. */
export function useProblemUpload<T extends UploadedProblem>({ draft, preview, save }: UploadTarget<T>) {
  const reading = shallowRef<T | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const saveFailure = shallowRef<ApiFailure | null>(null)
  const isReading = ref(false)
  const isSaving = ref(false)
  const fileText = ref<string | null>(null)

  const source = computed(() => {
    if (draft.file) return draft.file
    return draft.text.trim() === '' ? null : new File([draft.text], draft.textName, { type: 'text/plain' })
  })
  let turn = 0
  let timer: ReturnType<typeof setTimeout> | undefined
  async function read(): Promise<void> {
    const mine = ++turn
    const file = source.value
    const outcome = file && (await preview({ ...uploadOf(draft, file), name: '' }))
    // A newer text may have been sent meanwhile: only the last answer counts.
    if (mine !== turn) return
    reading.value = outcome?.ok ? outcome.value : null
    failure.value = outcome && !outcome.ok ? outcome.failure : null
    isReading.value = false
  }
  function readSoon(delay: number): void {
    clearTimeout(timer)
    turn++
    isReading.value = source.value !== null
    saveFailure.value = null
    draft.skipRejected = false
    timer = setTimeout(read, delay)
  }
  async function take(file: File | null): Promise<void> {
    readSoon(0)
    if (file && !draft.name) draft.name = file.name.replace(/\.[^.]*$/, '').slice(0, 120)
    const text = await textOf(file)
    if (draft.file === file) fileText.value = text
  }
  async function commit(): Promise<T | null> {
    if (!source.value) return null
    isSaving.value = true
    const outcome = await save(uploadOf(draft, source.value))
    isSaving.value = false
    saveFailure.value = outcome.ok ? null : outcome.failure
    return outcome.ok ? outcome.value : null
  }

  watch(
    () => draft.text,
    () => draft.file ?? readSoon(PAUSE_MILLISECONDS),
  )
  watch(
    () => draft.options,
    () => readSoon(PAUSE_MILLISECONDS / 2),
    { deep: true },
  )
  watch(() => draft.file, take)
  onMounted(() => draft.isEmpty || take(draft.file))
  onBeforeUnmount(() => clearTimeout(timer))

  return { draft, reading, failure, saveFailure, isReading, isSaving, fileText, commit }
}
