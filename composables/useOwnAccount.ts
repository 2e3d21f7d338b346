import type { AddressView } from '#shared/schemas/account'

/** Which address a link confirms. */
export const useNewAddress = (secret: string) => useResource<AddressView>(`/api/addresses/${secret}`)

/** Changes of one's own account. */
export function useOwnAccount() {
  const api = useApi()
  return {
    changePassword: (current: string, password: string) => api.put('/api/account/password', { current, password }),
    askAddress: (email: string, current: string) => api.post('/api/account/address', { email, current }),
    confirmAddress: (secret: string) => api.post(`/api/addresses/${secret}`),
  }
}
