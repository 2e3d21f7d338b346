import type { ApiFailure, Outcome } from './useApi'

/** Renaming, noting and deleting one problem: which of them is going on, and what went wrong. */
export function useProblemEdits(id: string, label: () => string, refresh: () => Promise<unknown>) {
  const { edit } = useProblemActions()
  const { erase } = useDeletions()
  const open = ref<'name' | 'note' | 'deletion' | null>(null)
  const isBusy = ref(false)
  const failure = shallowRef<ApiFailure | null>(null)
  watch(open, () => (failure.value = null))

  /** Keeps the form open when the server refused. */
  const run = async (send: () => Promise<Outcome<unknown>>, then: () => Promise<unknown>): Promise<void> => {
    isBusy.value = true
    const outcome = await send()
    failure.value = outcome.ok ? null : outcome.failure
    if (outcome.ok) {
      await then()
      open.value = null
    }
    isBusy.value = false
  }
  const isOpen = (which: NonNullable<typeof open.value>) =>
    computed({ get: () => open.value === which, set: (shown) => (open.value = shown ? which : null) })

  return {
    isBusy,
    failure,
    isRenaming: isOpen('name'),
    isNoting: isOpen('note'),
    isDeleting: isOpen('deletion'),
    rename: (name: string) => run(() => edit(id, { name }), refresh),
    note: (note: string) => run(() => edit(id, { note }), refresh),
    erase: () =>
      run(
        () => erase('problem', id, label()),
        async () => navigateTo('/'),
      ),
  }
}
