/** Width of the ledger in pixels, and whether it is worked with fingers. */
export function useLedgerWidth(element: Ref<HTMLElement | undefined>) {
  const width = ref(480)
  const isTouch = ref(false)
  let observer: ResizeObserver | null = null
  let pointer: MediaQueryList | null = null
  const readPointer = () => (isTouch.value = pointer?.matches ?? false)
  onMounted(() => {
    pointer = matchMedia('(pointer: coarse)')
    pointer.addEventListener('change', readPointer)
    readPointer()
    observer = new ResizeObserver(([entry]) => (width.value = entry!.contentRect.width))
    if (element.value) observer.observe(element.value)
  })
  onBeforeUnmount(() => {
    observer?.disconnect()
    pointer?.removeEventListener('change', readPointer)
  })
  return { width, isTouch }
}
