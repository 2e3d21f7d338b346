import type { ApiFailure, Outcome } from './useApi'

/** What can be open on the page of a problem. */
export type ProblemEdit = 'name' | 'note' | 'labels' | 'deletion'

/** Renaming, noting, relabelling, copying and deleting one problem: which of them is going on, and what went wrong. */
export function useProblemEdits(id: string, label: () => string, refresh: () => Promise<unknown>) {
  const { edit, relabel, duplicate } = useProblemActions()
  const { load } = useSession()
  const { erase } = useDeletions()
  const open = ref<ProblemEdit | null>(null)
  const isBusy = ref(false)
  const failure = shallowRef<ApiFailure | null>(null)
  watch(open, () => (failure.value = null))

  /** Keeps the form open when the server refused. */
  const run = async <T>(send: () => Promise<Outcome<T>>, then: (made: T) => Promise<unknown>): Promise<void> => {
    isBusy.value = true
    const outcome = await send()
    failure.value = outcome.ok ? null : outcome.failure
    if (outcome.ok) {
      await then(outcome.value)
      open.value = null
    }
    isBusy.value = false
  }
  const isNoting = computed({
    get: () => open.value === 'note',
    set: (shown) => (open.value = shown ? 'note' : null),
  })

  return {
    isBusy,
    failure,
    /** What went wrong where no form is open that could say it. */
    copyFailure: computed(() => (open.value === null ? failure.value : null)),
    editing: open,
    isNoting,
    rename: (name: string) => run(() => edit(id, { name }), refresh),
    note: (note: string) => run(() => edit(id, { note }), refresh),
    relabel: (version: number, renames: { from: string; to: string }[]) =>
      run(() => relabel(id, version, renames), refresh),
    /** Copies a version as a problem of its own and goes there. */
    duplicate: (version: number) =>
      run(
        () => duplicate(id, version),
        async (copy) => {
          await load()
          await navigateTo(`/problems/${copy.id}`)
        },
      ),
    erase: () =>
      run(
        () => erase('problem', id, label()),
        async () => navigateTo('/'),
      ),
  }
}
