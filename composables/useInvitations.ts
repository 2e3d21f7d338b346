import type { Page, Role } from '#shared/schemas/common'
import type { InvitationView, InvitedView, MadeInvitation } from '#shared/schemas/invitations'

/** Invitations that are open or have expired, for owners. */
export const useInvitations = () => useWholeList<Page<InvitationView>>('/api/invitations')

/** Inviting, sending again, withdrawing. */
export function useInviting() {
  const api = useApi()
  return {
    invite: (email: string, roles: Role[]) => api.post<MadeInvitation>('/api/invitations', { email, roles }),
    resend: (id: string) => api.post<MadeInvitation>(`/api/invitations/${id}/resend`),
    withdraw: (id: string) => api.remove(`/api/invitations/${id}`),
  }
}

/** What the link of an invitation is for. */
export const useInvited = (secret: string) => useResource<InvitedView>(`/api/invited/${secret}`)
