import type { MailState, OutboxView } from '#shared/schemas/mail'

const PER_PAGE = 50

function addressOf(state: MailState | null): string {
  return `/api/outbox?limit=${PER_PAGE}${state ? `&state=${encodeURIComponent(state)}` : ''}`
}

/** Messages to the people of the workspace, the first page. */
export const useOutbox = (state: MaybeRefOrGetter<MailState | null>) =>
  useResource<OutboxView>(() => addressOf(toValue(state)))

/** Further pages; all is looked at again as long as a message waits. */
export function useOutboxPages(
  state: MaybeRefOrGetter<MailState | null>,
  outbox: Ref<OutboxView | undefined>,
  refresh: () => Promise<unknown>,
) {
  useRefreshWhile(() => (outbox.value?.counts.waiting ?? 0) > 0, refresh)
  return useLaterPages(outbox, (cursor) => `${addressOf(toValue(state))}&cursor=${cursor}`)
}
