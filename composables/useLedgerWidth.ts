/** Size of the root's letters that the pixels of the ledger's columns are meant for. */
const ROOT_PIXELS = 16

/**
 * Width of the ledger in pixels of letters of the usual size, how much larger than those its letters are, and whether it
 * is worked with fingers.
 */
export function useLedgerWidth(element: Ref<HTMLElement | undefined>) {
  const width = ref(480)
  const scale = ref(1)
  const isTouch = ref(false)
  let observer: ResizeObserver | null = null
  let pointer: MediaQueryList | null = null
  const readPointer = () => (isTouch.value = pointer?.matches ?? false)
  onMounted(() => {
    pointer = matchMedia('(pointer: coarse)')
    pointer.addEventListener('change', readPointer)
    readPointer()
    observer = new ResizeObserver(([entry]) => {
      // On very large screens letters are larger: so must the columns be, and fewer of them fit.
      const root = Number.parseFloat(getComputedStyle(document.documentElement).fontSize) || ROOT_PIXELS
      scale.value = root / ROOT_PIXELS
      width.value = entry!.contentRect.width / scale.value
    })
    if (element.value) observer.observe(element.value)
  })
  onBeforeUnmount(() => {
    observer?.disconnect()
    pointer?.removeEventListener('change', readPointer)
  })
  return { width, scale, isTouch }
}
