import type { NewPasskey, PasskeyChallenge, PasskeysView, Proof, UsedPasskey } from '#shared/schemas/passkeys'
import type { Outcome } from './useApi'
import { passkeyObstacle, passkeyRefusal } from '~/utils/team/passkeys'

/** Passkeys of one's own. */
export const usePasskeys = () => useResource<PasskeysView>('/api/account/passkeys')

/** Why passkeys cannot be used in this browser at this address; known once the page is shown. */
export function usePasskeyObstacle() {
  const obstacle = ref<string>()
  onMounted(() => {
    const isKnown = typeof window.PublicKeyCredential === 'function'
    obstacle.value = passkeyObstacle({ isSecure: window.isSecureContext, hostname: location.hostname, isKnown })
  })
  return obstacle
}

/** What the browser has to say of passkeys, fetched when it is first asked. */
const browser = () => import('@simplewebauthn/browser')
type Browser = Awaited<ReturnType<typeof browser>>

/** Lets the browser answer a challenge. */
async function answered<T>(
  asked: Outcome<PasskeyChallenge>,
  answer: (webauthn: Browser, options: never) => Promise<T>,
): Promise<Outcome<{ challengeId: string; credential: T }>> {
  if (!asked.ok) return asked
  const { challengeId, options } = asked.value
  try {
    return { ok: true, value: { challengeId, credential: await answer(await browser(), options as never) } }
  } catch (error) {
    return { ok: false, failure: { status: 0, code: 'passkey.none', message: passkeyRefusal(error), issues: [] } }
  }
}

/** Using passkeys, making, renaming and removing them. */
export function usePasskeyActions() {
  const api = useApi()
  const ask = async (): Promise<Outcome<UsedPasskey>> =>
    answered(await api.post<PasskeyChallenge>('/api/passkeys/challenge'), (webauthn, optionsJSON) =>
      webauthn.startAuthentication({ optionsJSON }),
    )
  return {
    /** Lets the person choose a passkey, to sign in with or to prove who they are. */
    ask,
    /** Makes a passkey and keeps it. */
    async add(name: string, proof: Proof): Promise<Outcome<unknown>> {
      const asked = await api.post<PasskeyChallenge>('/api/account/passkeys/challenge', { ...proof })
      const made = await answered(asked, (webauthn, optionsJSON) => webauthn.startRegistration({ optionsJSON }))
      if (!made.ok) return made
      const given = { name, ...made.value } satisfies Pick<NewPasskey, 'name' | 'challengeId'>
      return api.post('/api/account/passkeys', given)
    },
    rename: (id: string, name: string) => api.patch(`/api/account/passkeys/${id}`, { name }),
    remove: (id: string) => api.remove(`/api/account/passkeys/${id}`),
  }
}
