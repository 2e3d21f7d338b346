import type { BudgetEntryView, BudgetView } from '#shared/schemas/budget'
import type { Page } from '#shared/schemas/common'

const PER_PAGE = 50
const ENTRIES = `/api/budget/entries?limit=${PER_PAGE}`

/** Machine time granted, held and spent. */
export const useBudget = () => useResource<BudgetView>('/api/budget')

/** Entries of the ledger, newest first, the first page. */
export const useBudgetEntries = () => useResource<Page<BudgetEntryView>>(ENTRIES)

/** Further pages of them. */
export const useBudgetPages = (first: Ref<Page<BudgetEntryView> | undefined>) =>
  useLaterPages(first, (cursor) => `${ENTRIES}&cursor=${cursor}`)

/** Granting and taking back. */
export function useBudgetActions() {
  const api = useApi()
  return {
    /** @param seconds below 0 to take back */
    grant: (seconds: number, machineId: string | null, remark: string) =>
      api.post('/api/budget/grants', { seconds, machineId, remark }),
  }
}
