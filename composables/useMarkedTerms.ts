/**
 * Focus and selection of the problem graph by label, for the ledger of both forms beside it.
 *
 * @param problemId the selection starts afresh with another problem
 */
export function useMarkedTerms(problemId: string) {
  const selection = useSelectionStore()
  const labels = shallowRef<readonly string[]>([])
  onMounted(() => selection.begin(`problem ${problemId}`))
  const focus = computed(() => (selection.focused === null ? null : (labels.value[selection.focused] ?? null)))
  const selected = computed(() => new Set(Array.from(selection.selected, (variable) => labels.value[variable])))
  const isMarked = (...ends: readonly string[]): boolean =>
    ends.some((label) => label === focus.value) || (ends.length > 0 && ends.every((label) => selected.value.has(label)))
  return { isMarked, give: (given: readonly string[]) => void (labels.value = given) }
}
