import type { Sort } from '~/utils/ui/parts'

/** Rows in the order of the heading chosen; `keys` answers what each heading sorts by. */
export function useSortedRows<T>(
  items: () => readonly T[],
  keys: Readonly<Record<string, (item: T) => string | number>>,
  first: Sort,
) {
  const sort = ref<Sort>(first)
  const rows = computed(() => {
    const key = keys[sort.value.field]!
    const sign = sort.value.direction === 'ascending' ? 1 : -1
    return [...items()].sort((a, b) => sign * (key(a) < key(b) ? -1 : key(a) > key(b) ? 1 : 0))
  })
  return { sort, rows }
}
