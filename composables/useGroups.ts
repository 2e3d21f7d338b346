import type { GroupsView, SaveGroups } from '#shared/schemas/groups'
import type { ApiFailure } from './useApi'

/** Constraint groups of a problem: recognised and confirmed. Loaded in the browser, since recognising may take seconds. */
export function useGroups(id: string, version: () => number | undefined) {
  const api = useApi()
  const groups = shallowRef<GroupsView | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const saveFailure = shallowRef<ApiFailure | null>(null)
  const isSaving = ref(false)

  const load = async (): Promise<void> => {
    failure.value = null
    const query = version() === undefined ? '' : `?version=${version()}`
    try {
      groups.value = await $fetch<GroupsView>(`/api/problems/${id}/groups${query}`)
    } catch (error) {
      failure.value = failureOf(error)
    }
  }
  /** Saves all groups at once; true once they are. */
  const save = async (request: SaveGroups): Promise<boolean> => {
    isSaving.value = true
    const outcome = await api.put(`/api/problems/${id}/groups`, request)
    saveFailure.value = outcome.ok ? null : outcome.failure
    if (outcome.ok) await load()
    isSaving.value = false
    return outcome.ok
  }
  return { groups, failure, load, save, saveFailure, isSaving }
}
