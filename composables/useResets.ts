import type { MadeReset, ResetView } from '#shared/schemas/account'

/** Whose password a link changes. */
export const useReset = (secret: string) => useResource<ResetView>(`/api/resets/${secret}`)

/** Asking for a link for a new password, making one for a member, using one. */
export function useResetting() {
  const api = useApi()
  return {
    ask: (email: string) => api.post('/api/resets', { email }),
    makeFor: (memberId: string) => api.post<MadeReset>(`/api/people/${memberId}/reset-link`),
    choose: (secret: string, password: string) => api.post(`/api/resets/${secret}`, { password }),
  }
}
