import type { Page, Role } from '#shared/schemas/common'
import type { MemberView } from '#shared/schemas/session'
import { workspaceHeaders } from '~/utils/team/shownWorkspace'

export const usePeople = () => useResource<Page<MemberView>>('/api/people')

/** Members, for whoever may mention them. */
export const useMentionable = () =>
  useLateLoad(async () => (await $fetch<Page<MemberView>>('/api/people', { headers: workspaceHeaders() })).items)

/** Changes of who belongs to the workspace, and as what. */
export function useMembers() {
  const api = useApi()
  return {
    changeRoles: (id: string, roles: Role[]) => api.patch(`/api/people/${id}`, { roles }),
    remove: (id: string) => api.remove(`/api/people/${id}`),
    /** Takes oneself out. */
    leave: () => api.remove('/api/account/membership'),
  }
}
