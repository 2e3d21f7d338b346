import type { NewsItem, NewsView, UnreadNews } from '#shared/schemas/news'
import type { ApiFailure } from './useApi'

const PER_PAGE = 50

const addressOf = (unreadOnly: boolean): string => `/api/news?limit=${PER_PAGE}${unreadOnly ? '&unread=true' : ''}`

/** What one is told in the workspace, the first page. */
export const useNews = (unreadOnly: MaybeRefOrGetter<boolean>) =>
  useResource<NewsView>(() => addressOf(toValue(unreadOnly)))

/**
 * Further pages, reading, and what comes meanwhile: what was read here stays in its place on the page, and where further
 * pages are shown, what is new waits to be asked for.
 */
export function useNewsPages(
  unreadOnly: MaybeRefOrGetter<boolean>,
  news: Ref<NewsView | undefined>,
  refresh: () => Promise<unknown>,
) {
  const pages = useLaterPages(news, (cursor) => `${addressOf(toValue(unreadOnly))}&cursor=${cursor}`)
  const reading = useReadingNews()
  const items = computed(() =>
    pages.items.value.map((item) => ({ ...item, readAt: item.readAt ?? reading.readHere.value.get(item.id) ?? null })),
  )
  const isBehind = ref(false)
  const catchUp = async (): Promise<void> => {
    await refresh()
    isBehind.value = false
  }
  watch(useNewsChanges(), () => {
    if (pages.items.value.length > (news.value?.items.length ?? 0)) isBehind.value = true
    else void catchUp()
  })
  const readAll = () => reading.readAll(items.value)
  return { ...pages, ...reading, items, readAll, isBehind, catchUp }
}

/** Marks news as read; the number of what is left is shown around every page. */
function useReadingNews() {
  const { session } = useSession()
  const api = useApi()
  /** When, by id. */
  const readHere = ref(new Map<string, string>())
  const isReading = ref(false)
  const refused = shallowRef<ApiFailure | null>(null)

  async function mark(url: string, ids: readonly string[], body?: Record<string, unknown>): Promise<void> {
    isReading.value = true
    const outcome = await api.post<UnreadNews>(url, body)
    refused.value = outcome.ok ? null : outcome.failure
    isReading.value = false
    if (!outcome.ok) return
    const at = new Date().toISOString()
    for (const id of ids) readHere.value.set(id, at)
    if (session.value) session.value.unread = outcome.value.unread
  }
  return {
    ...{ readHere, isReading, refused },
    read: (id: string) => mark(`/api/news/${id}/read`, [id]),
    /** Of what came after the newest of these nothing was seen. */
    readAll: (items: readonly NewsItem[]) =>
      mark(
        '/api/news/read',
        items.map(({ id }) => id),
        { upTo: items[0]?.at },
      ),
  }
}
