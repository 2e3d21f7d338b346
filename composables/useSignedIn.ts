import type { Page } from '#shared/schemas/common'
import type { SignedInView } from '#shared/schemas/account'

/** Where one is signed in. */
export const useSignedIn = () => useWholeList<Page<SignedInView>>('/api/sessions')

/** Ends sessions of one's own, then looks again. */
export function useEndingSessions(refresh: () => Promise<unknown>) {
  const api = useApi()
  const ended = async (url: string) => {
    const outcome = await api.remove(url)
    await refresh()
    return outcome
  }
  return {
    end: (id: string) => ended(`/api/sessions/${id}`),
    endOthers: () => ended('/api/sessions'),
  }
}
