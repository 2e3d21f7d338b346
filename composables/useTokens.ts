import type { Page, Role } from '#shared/schemas/common'
import type { MadeToken, TokenView } from '#shared/schemas/tokens'

const PER_PAGE = 50

/** Tokens for scripts, newest first: one's own, for owners everybody's. */
export const useTokens = () => useResource<Page<TokenView>>(`/api/tokens?limit=${PER_PAGE}`)

/** Further pages of them. */
export const useTokenPages = (first: Ref<Page<TokenView> | undefined>) =>
  useLaterPages(first, (cursor) => `/api/tokens?limit=${PER_PAGE}&cursor=${cursor}`)

/** Making and revoking. */
export function useTokenActions() {
  const api = useApi()
  return {
    /** @param expiresAt ISO 8601, or null for a token that stands until it is revoked */
    make: (name: string, role: Role, expiresAt: string | null) =>
      api.post<MadeToken>('/api/tokens', { name, role, expiresAt }),
    revoke: (id: string) => api.remove(`/api/tokens/${id}`),
  }
}
