/** Text for a live region: follows its source, but changes at most once in so many milliseconds; nothing is not said. */
export function useCalmText(source: () => string, leastMilliseconds: number) {
  const text = ref('')
  let last = -Infinity
  let timer: ReturnType<typeof setTimeout> | undefined
  const say = (): void => {
    timer = undefined
    last = Date.now()
    text.value = source()
  }
  onMounted(() =>
    watch(
      source,
      () => {
        if (source() === '') return
        timer ??= setTimeout(say, Math.max(0, last + leastMilliseconds - Date.now()))
      },
      { immediate: true },
    ),
  )
  onBeforeUnmount(() => clearTimeout(timer))
  return text
}
