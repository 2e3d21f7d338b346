const PAUSE_MILLISECONDS = 3000

/** Loads anew every three seconds as long as something on the page is under way. */
export function useRefreshWhile(isUnderWay: () => boolean, refresh: () => Promise<unknown>) {
  let timer: ReturnType<typeof setInterval> | undefined
  onMounted(() => {
    timer = setInterval(() => isUnderWay() && !document.hidden && refresh(), PAUSE_MILLISECONDS)
  })
  onBeforeUnmount(() => clearInterval(timer))
}
