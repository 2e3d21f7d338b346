import type { NewsTold } from '#shared/schemas/news'
import { WORKSPACE_HEADER } from '#shared/workspace-header'

/** How one’s news stands; or that nothing more is told, because the session ended or went to another workspace. */
export type NewsReport = { told: NewsTold } | 'over'

/** Until it is tried again after a refusal that may pass, such as of a proxy whose server starts anew. */
const FIRST_WAIT_MS = 2_000
const LONGEST_WAIT_MS = 60_000

/** Whether the server would tell news to this browser, for that workspace. */
async function isRefused(workspaceId: string): Promise<boolean> {
  const { status } = await fetch('/api/news/unread', { headers: { [WORKSPACE_HEADER]: workspaceId } })
  return status === 401 || status === 409
}

/**
 * Follows one’s news by server-sent events until it is ended or over. Broken connections are the browser’s to mend; where
 * it gave up, this looks whether it is over or to be tried again, less and less often.
 * @returns how to end it
 */
export function openNewsStream(workspaceId: string, report: (report: NewsReport) => void): () => void {
  let source: EventSource
  let timer: ReturnType<typeof setTimeout> | undefined
  let wait = FIRST_WAIT_MS
  let isEnded = false

  const tryLater = (): void => {
    timer = setTimeout(open, wait)
    wait = Math.min(2 * wait, LONGEST_WAIT_MS)
  }
  async function refused(): Promise<void> {
    const isOver = await isRefused(workspaceId).catch(() => false)
    if (isEnded) return
    if (isOver) report('over')
    else tryLater()
  }
  function open(): void {
    source = new EventSource(`/api/news/events?workspace=${encodeURIComponent(workspaceId)}`)
    source.addEventListener('news', ({ data }) => {
      wait = FIRST_WAIT_MS
      report({ told: JSON.parse(data) as NewsTold })
    })
    source.addEventListener('error', () => {
      if (source.readyState === EventSource.CLOSED) void refused()
    })
  }
  open()
  return () => {
    isEnded = true
    clearTimeout(timer)
    source.close()
  }
}
