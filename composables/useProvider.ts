import type { IdentityView, ProviderAddress } from '#shared/schemas/identities'
import type { Proof } from '#shared/schemas/passkeys'
import type { Outcome } from './useApi'

/** How one’s account stands to the outside identity provider. */
export const useIdentity = () => useResource<IdentityView>('/api/account/identity')

/** Going to the provider, which sends back to where one wants to go on. */
export function useProvider() {
  const api = useApi()
  const gone = async (asked: Promise<Outcome<ProviderAddress>>): Promise<Outcome<ProviderAddress>> => {
    const outcome = await asked
    if (outcome.ok) await navigateTo(outcome.value.url, { external: true })
    return outcome
  }
  return {
    /** @param invitation secret of the invitation that is to be accepted */
    signIn: (next: string, invitation?: string) =>
      gone(api.post<ProviderAddress>('/api/provider', { next, invitation })),
    link: (proof: Proof) => gone(api.post<ProviderAddress>('/api/account/identity', { ...proof })),
    unlink: () => api.remove('/api/account/identity'),
  }
}
