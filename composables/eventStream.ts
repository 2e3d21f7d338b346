/** Until it is tried again where the browser gave up, such as after a refusal by a proxy whose server starts anew. */
const FIRST_WAIT_MS = 2_000
const LONGEST_WAIT_MS = 60_000

interface Followed {
  url: string
  /** Name of the events. */
  event: string
  take: (data: string) => void
  /** Asked where the browser gave up: whether there is nothing more to follow. Else it is tried again, less and less often. */
  isOver: () => Promise<boolean>
  over?: () => void
}

/**
 * Follows server-sent events until that is ended or over. Broken connections are the browser’s to mend.
 * @returns how to end it
 */
export function followEvents({ url, event, take, isOver, over }: Followed): () => void {
  let source: EventSource
  let timer: ReturnType<typeof setTimeout> | undefined
  let wait = FIRST_WAIT_MS
  let isEnded = false

  const tryLater = (): void => {
    timer = setTimeout(open, wait)
    wait = Math.min(2 * wait, LONGEST_WAIT_MS)
  }
  async function gaveUp(): Promise<void> {
    const isLast = await isOver().catch(() => false)
    if (isEnded) return
    if (isLast) over?.()
    else tryLater()
  }
  function open(): void {
    source = new EventSource(url)
    source.addEventListener(event, ({ data }: MessageEvent<string>) => {
      wait = FIRST_WAIT_MS
      take(data)
    })
    source.addEventListener('error', () => {
      if (source.readyState === EventSource.CLOSED) void gaveUp()
    })
  }
  open()
  return () => {
    isEnded = true
    clearTimeout(timer)
    source.close()
  }
}
