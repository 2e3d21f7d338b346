import type { MailState, OutboxView } from '#shared/schemas/mail'

const PER_PAGE = 50

/** Messages to the people of the workspace, looked at again as long as one waits. */
export async function useOutbox(state: MaybeRefOrGetter<MailState | null>) {
  const address = computed(() => {
    const chosen = toValue(state)
    return `/api/outbox?limit=${PER_PAGE}${chosen ? `&state=${encodeURIComponent(chosen)}` : ''}`
  })
  const { data: outbox, failure, refresh, status } = await useResource<OutboxView>(address)
  useRefreshWhile(() => (outbox.value?.counts.waiting ?? 0) > 0, refresh)
  const later = useLaterPages(outbox, (cursor) => `${address.value}&cursor=${cursor}`)
  return { outbox, failure, refresh, status, ...later }
}
