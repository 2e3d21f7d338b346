const TICK_MS = 200

/** The time in milliseconds since 1970, moving while the component is on the page; 0 until then. */
export function useIntervalClock() {
  const now = ref(0)
  let timer: ReturnType<typeof setInterval> | undefined
  onMounted(() => {
    now.value = Date.now()
    timer = setInterval(() => {
      now.value = Date.now()
    }, TICK_MS)
  })
  onBeforeUnmount(() => clearInterval(timer))
  return now
}
