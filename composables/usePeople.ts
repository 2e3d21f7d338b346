import type { Page, Role } from '#shared/schemas/common'
import type { MemberView } from '#shared/schemas/session'
import { wholeList } from '~/utils/ui/wholeList'
import { workspaceHeaders } from '~/utils/team/shownWorkspace'

export const usePeople = () => useWholeList<Page<MemberView>>('/api/people')

/** All members, for whoever may mention them: names that are typed out count as those that are chosen. */
export const useMentionable = () =>
  useLateLoad(async () => {
    const readPage = (address: string) => $fetch<Page<MemberView>>(address, { headers: workspaceHeaders() })
    return (await wholeList('/api/people', readPage)).items
  })

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
