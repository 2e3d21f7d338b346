import type { Page } from '#shared/schemas/common'
import { wholeList } from '~/utils/ui/wholeList'

/** Loads a list whose page shows or counts all of it. */
export const useWholeList = <T extends Page<unknown>>(url: MaybeRefOrGetter<string>) => useResource<T>(url, wholeList)
