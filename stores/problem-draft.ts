/** How the file is to be read; null leaves it to the file or to detection. */
export interface ReadingOptions {
  format: string | null
  form: string | null
  convention: string | null
  sense: string | null
}

const asTheFileSays = (): ReadingOptions => ({ format: null, form: null, convention: null, sense: null })

function newDraft() {
  const text = ref('')
  /** Name under which the pasted text is handed in. */
  const textName = ref('pasted.txt')
  const file = shallowRef<File | null>(null)
  const name = ref('')
  const options = ref(asTheFileSays())
  const skipRejected = ref(false)

  const isEmpty = computed(() => !file.value && text.value.trim() === '')
  const clear = (): void => {
    text.value = ''
    textName.value = 'pasted.txt'
    file.value = null
    name.value = ''
    options.value = asTheFileSays()
    skipRejected.value = false
  }
  return { text, textName, file, name, options, skipRejected, isEmpty, clear }
}

const draftStore = (id: string) => defineStore(id, newDraft)

/** A problem that is being brought in: outlives leaving the page, so that nothing typed or chosen is lost. */
export const useProblemDraft = draftStore('problem draft')

/** A version of a problem that is being brought in: outlives leaving the page too, for each problem its own. */
export const useVersionDraft = (problemId: string) => draftStore(`version draft ${problemId}`)()
