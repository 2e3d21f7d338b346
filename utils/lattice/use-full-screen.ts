import { nextTick, onBeforeUnmount, onMounted, ref, watch } from 'vue'
import type { Ref } from 'vue'

export interface FullScreen {
  readonly isFull: Ref<boolean>
  toggle(): Promise<void>
}

/**
 * An element over the whole page, and the page on the whole screen where the browser gives it away. Not the element
 * alone: menus, dialogs and explanations hang on the body and would be out of sight. What lies beneath is inert.
 */
export function useFullScreen(element: () => HTMLElement | undefined): FullScreen {
  const isFull = ref(false)
  let covered: HTMLElement[] = []
  const follow = () => {
    if (!document.fullscreenElement) isFull.value = false
  }
  const leaveOnEscape = (event: KeyboardEvent) => {
    if (event.key === 'Escape' && isFull.value && !event.defaultPrevented && !document.fullscreenElement)
      isFull.value = false
  }
  const uncover = () => {
    for (const part of covered) part.inert = false
    covered = []
  }

  watch(isFull, async (now) => {
    uncover()
    if (!now) return
    await nextTick()
    covered = element() ? coveredBy(element()!) : []
    for (const part of covered) part.inert = true
  })
  onMounted(() => {
    document.addEventListener('fullscreenchange', follow)
    document.addEventListener('keydown', leaveOnEscape)
  })
  onBeforeUnmount(() => {
    document.removeEventListener('fullscreenchange', follow)
    document.removeEventListener('keydown', leaveOnEscape)
    uncover()
    if (isFull.value && document.fullscreenElement) void document.exitFullscreen()
  })

  return {
    isFull,
    async toggle() {
      isFull.value = !isFull.value
      if (isFull.value) await document.documentElement.requestFullscreen?.().catch(() => undefined)
      else if (document.fullscreenElement) await document.exitFullscreen()
    },
  }
}

/** Everything of the page but the element, what it is in and what is in it. What hangs on the body stays in reach. */
function coveredBy(element: HTMLElement): HTMLElement[] {
  const others: HTMLElement[] = []
  for (let part = element; part.parentElement && part.parentElement !== document.body; part = part.parentElement)
    for (const other of part.parentElement.children)
      if (other !== part && other instanceof HTMLElement && !other.inert) others.push(other)
  return others
}
