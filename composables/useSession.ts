import type { UsedPasskey } from '#shared/schemas/passkeys'
import type { EntranceView, SessionView } from '#shared/schemas/session'
import type { Role } from '#shared/schemas/common'

/** Who is signed in; shared by the layout and the pages, loaded once and refreshed on demand. */
export function useSession() {
  const session = useState<SessionView | null>('session', () => null)
  const fetcher = useRequestFetch()
  const api = useApi()

  const load = async (): Promise<void> => {
    try {
      session.value = await fetcher<SessionView>('/api/session')
    } catch (error) {
      // A server that is busy signs nobody out.
      if (failureOf(error).status === 401) session.value = null
    }
  }
  const may = (...roles: Role[]): boolean => session.value?.roles.some((role) => roles.includes(role)) ?? false

  /** Reviews run sheets: in a role, or in the place of a reviewer who is away. */
  const mayReview = computed(() => may('reviewer') || (session.value?.reviewsFor.length ?? 0) > 0)

  const enter = async (url: string, body: Record<string, unknown>) => {
    const outcome = await api.post(url, body)
    if (outcome.ok) await load()
    return outcome
  }
  return {
    session,
    load,
    may,
    mayReview,
    signIn: (email: string, password: string) => enter('/api/session', { email, password }),
    signInByPasskey: (used: UsedPasskey) => enter('/api/session/passkey', { ...used }),
    setUp: (body: Record<string, unknown>) => enter('/api/setup', body),
    join: (secret: string, body: { name: string; password: string }) => enter(`/api/invited/${secret}`, body),
    joinSignedIn: (secret: string) => enter('/api/account/membership', { secret }),
    async signOut() {
      await api.remove('/api/session')
      // A whole new page, so that nothing of this person stays in memory.
      await navigateTo('/sign-in', { external: true })
    },
  }
}

/** What the sign-in page needs before anyone is signed in. */
export const useEntrance = () => useResource<EntranceView>('/api/entrance')
