import type { NewsTold } from '#shared/schemas/news'
import type { NewsReport } from './newsStream'
import { openNewsStream } from './newsStream'

/** How often news came, or was read elsewhere, since this tab was opened: for a page that shows it. */
export const useNewsChanges = () => useState('news changes', () => 0)

/**
 * Keeps the number of unread news true while a page is looked at, and says what came. A tab that nobody sees follows
 * nothing, as HTTP/1.1 allows a browser six connections to a host for all its tabs; seen again it is told how things stand.
 * @returns what is said to screen readers
 */
export function useNewsLive() {
  const { session } = useSession()
  const changes = useNewsChanges()
  const said = ref('')
  let end: (() => void) | null = null
  /** When the newest was written that this tab knows of; null before it was told. */
  let known: string | null = null

  function take({ unread, newest }: NewsTold): void {
    if (!session.value) return
    const before = session.value.unread
    const isNew = known !== null && newest !== null && newest.at > known
    if (isNew && !newest.readAt)
      said.value = unread > before + 1 ? `${unread - before} new in News. ${newest.title}` : `News: ${newest.title}`
    if (isNew || unread !== before) changes.value++
    known = newest?.at ?? ''
    session.value.unread = unread
  }
  function hear(report: NewsReport): void {
    if (report !== 'over') return take(report.told)
    stop()
    // Of whoever is signed in now nothing is known here.
    if (session.value) session.value.unread = 0
  }
  function start(): void {
    if (end || document.hidden || !session.value) return
    end = openNewsStream(session.value.workspace.id, hear)
  }
  function stop(): void {
    end?.()
    end = null
  }
  const followWhileSeen = (): void => (document.hidden ? stop() : start())

  onMounted(() => {
    start()
    document.addEventListener('visibilitychange', followWhileSeen)
  })
  onBeforeUnmount(() => {
    stop()
    document.removeEventListener('visibilitychange', followWhileSeen)
  })
  return said
}
