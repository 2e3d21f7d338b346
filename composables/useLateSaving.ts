const WAIT_MS = 600

/**
 * Collects changes by field and sends them together, a moment after the last one and one request at a time. What was
 * refused is kept and goes along with the next change.
 * @param send answers whether the change was accepted
 */
export function useLateSaving<Change extends object>(send: (change: Partial<Change>) => Promise<boolean>) {
  const pending = shallowRef<Partial<Change>>({})
  let timer: ReturnType<typeof setTimeout> | undefined
  let sending: Promise<void> | null = null

  const isEmpty = computed(() => Object.keys(pending.value).length === 0)
  const holds = (field: keyof Change): boolean => field in pending.value

  async function sendAll(): Promise<void> {
    while (!isEmpty.value) {
      const change = pending.value
      pending.value = {}
      if (await send(change)) continue
      pending.value = { ...change, ...pending.value }
      return
    }
  }

  /** Sends what waits, now. */
  async function flush(): Promise<void> {
    clearTimeout(timer)
    sending ??= sendAll().finally(() => {
      sending = null
    })
    await sending
  }

  function wait(): void {
    clearTimeout(timer)
    timer = setTimeout(() => void flush(), WAIT_MS)
  }

  function add(change: Partial<Change>): void {
    pending.value = { ...pending.value, ...change }
    wait()
  }

  function drop(field: keyof Change): void {
    const { [field]: _dropped, ...others } = pending.value
    pending.value = others as Partial<Change>
  }

  function clear(): void {
    clearTimeout(timer)
    pending.value = {}
  }

  const leave = (): void => void flush()
  // Reloading or closing within the moment of waiting must not lose the change.
  onMounted(() => window.addEventListener('pagehide', leave))
  onBeforeUnmount(() => {
    window.removeEventListener('pagehide', leave)
    leave()
  })
  return { isEmpty, holds, add, drop, clear, flush }
}
