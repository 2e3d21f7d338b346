import { onBeforeUnmount, onMounted, ref } from 'vue'
import type { Ref } from 'vue'

export interface FullScreen {
  readonly isFull: Ref<boolean>
  toggle(): Promise<void>
}

/** An element on the whole screen; over the whole page where the browser gives no screen away. */
export function useFullScreen(element: Ref<HTMLElement | undefined>): FullScreen {
  const isFull = ref(false)
  const follow = () => (isFull.value = document.fullscreenElement === element.value)
  const leaveOnEscape = (event: KeyboardEvent) => {
    if (event.key === 'Escape' && isFull.value && !document.fullscreenElement) isFull.value = false
  }

  onMounted(() => {
    document.addEventListener('fullscreenchange', follow)
    document.addEventListener('keydown', leaveOnEscape)
  })
  onBeforeUnmount(() => {
    document.removeEventListener('fullscreenchange', follow)
    document.removeEventListener('keydown', leaveOnEscape)
  })

  return {
    isFull,
    async toggle() {
      if (document.fullscreenElement) return document.exitFullscreen()
      if (isFull.value || !element.value?.requestFullscreen) {
        isFull.value = !isFull.value
        return
      }
      await element.value.requestFullscreen().catch(() => (isFull.value = true))
    },
  }
}
