import type { Page } from '#shared/schemas/common'
import type { ApiFailure } from './useApi'

/** Joins further pages of a list to its first one; loading the first one anew drops them. */
export function useLaterPages<T>(first: Ref<Page<T> | null | undefined>, addressOf: (cursor: string) => string) {
  const later = shallowRef<{ after?: Page<T> | null; pages: Page<T>[] }>({ pages: [] })
  const isLoadingMore = ref(false)
  const moreFailure = shallowRef<ApiFailure | null>(null)

  const pages = computed(() => {
    if (!first.value) return []
    return [first.value, ...(later.value.after === first.value ? later.value.pages : [])]
  })
  const items = computed(() => pages.value.flatMap((page) => page.items))
  const nextCursor = computed(() => pages.value.at(-1)?.nextCursor ?? null)

  const more = async (): Promise<void> => {
    if (!nextCursor.value || isLoadingMore.value) return
    isLoadingMore.value = true
    try {
      const page = await $fetch<Page<T>>(addressOf(nextCursor.value))
      later.value = { after: first.value, pages: [...pages.value.slice(1), page] }
      moreFailure.value = null
    } catch (error) {
      moreFailure.value = failureOf(error)
    }
    isLoadingMore.value = false
  }
  return { items, hasMore: computed(() => nextCursor.value !== null), more, isLoadingMore, moreFailure }
}
