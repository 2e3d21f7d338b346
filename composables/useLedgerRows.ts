import { filterRows, isFiltering, NO_FILTER, onlyChoices } from '~/utils/lattice/ledger-filter'
import type { LedgerFilter } from '~/utils/lattice/ledger-filter'
import { LENS_SORT, nextSort, sortRows } from '~/utils/lattice/ledger'
import type { LedgerColumn, LedgerSort } from '~/utils/lattice/ledger'
import type { LedgerRow } from '~/utils/lattice/types'

/** Rows of the chain ledger as they are filtered and sorted, and those of them that are selected. */
export function useLedgerRows(rows: () => readonly LedgerRow[]) {
  const selection = useSelectionStore()
  const filter = ref<LedgerFilter>(NO_FILTER)
  const sort = ref<LedgerSort>(LENS_SORT[selection.lens])

  const choices = computed(() => onlyChoices(rows(), selection.lens, selection.selected))
  // A condition that the lens does not know, or that no chain meets any more, hides nothing.
  const applied = computed<LedgerFilter>(() => {
    const isOpen = choices.value.some(({ only }) => only === filter.value.only)
    return isOpen ? filter.value : { ...filter.value, only: null }
  })
  const sorted = computed(() => sortRows(rows(), sort.value))
  const shown = computed(() => filterRows(sorted.value, applied.value, selection.lens, selection.selected))
  const order = computed(() => shown.value.map(({ variable }) => variable))
  const selectedRows = computed(() => sorted.value.filter(({ variable }) => selection.selected.has(variable)))

  watch(
    () => selection.lens,
    (lens) => (sort.value = LENS_SORT[lens]),
  )
  return {
    filter,
    sort,
    choices,
    applied,
    shown,
    order,
    selectedRows,
    isFiltered: computed(() => isFiltering(applied.value)),
    sortBy: (column: LedgerColumn) => void (sort.value = nextSort(sort.value, column)),
    showAll: () => void (filter.value = NO_FILTER),
  }
}
