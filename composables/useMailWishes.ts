import type { ChosenMailKind, MailWishes } from '#shared/schemas/mail'

/** Which messages of the workspace one gets. */
export const useMailWishes = () => useResource<MailWishes>('/api/account/mails')

/** Saying so. */
export function useWishing() {
  const api = useApi()
  return (wanted: ChosenMailKind[]) => api.put('/api/account/mails', { wanted })
}
