import type { Page } from '#shared/schemas/common'
import type { ComparedVersions, VersionItem } from '#shared/schemas/problem-versions'
import type { ApiFailure } from './useApi'

/** Versions of a problem, newest first: the first page, and more each time they are asked for; and any two compared. */
export async function useVersions(id: string) {
  const address = `/api/problems/${id}/versions`
  const { data, failure, refresh } = await useResource<Page<VersionItem>>(address)
  const later = useLaterPages<VersionItem>(data, (cursor) => `${address}?cursor=${encodeURIComponent(cursor)}`)
  const comparison = useVersionComparison(id)
  const shown = computed(() => ({
    versions: later.items.value,
    compared: comparison.compared.value,
    comparing: comparison.isLoading.value,
    hasMore: later.hasMore.value,
    failure: failure.value ?? later.moreFailure.value ?? comparison.failure.value,
  }))
  return { shown, more: later.more, compare: comparison.compare, refresh }
}

/** What changed between two versions, loaded in the browser once they are chosen. */
function useVersionComparison(id: string) {
  const compared = shallowRef<ComparedVersions | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const isLoading = ref(false)
  let turn = 0
  const compare = async (from: number, to: number): Promise<void> => {
    const mine = ++turn
    isLoading.value = true
    try {
      const answer = await $fetch<ComparedVersions>(`/api/problems/${id}/versions/compare?from=${from}&to=${to}`)
      if (mine === turn) compared.value = answer
      failure.value = null
    } catch (error) {
      if (mine === turn) failure.value = failureOf(error)
    }
    if (mine === turn) isLoading.value = false
  }
  return { compared, failure, isLoading, compare }
}

/** The version that an address asks for; null is the current one. */
export function useAskedVersion() {
  const route = useRoute()
  return computed(() => {
    const version = Number(route.query.version)
    return Number.isSafeInteger(version) && version > 0 ? version : null
  })
}
