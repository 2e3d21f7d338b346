import { onBeforeUnmount, ref } from 'vue'
import type { Ref } from 'vue'

export interface CameraKeys {
  /** What is to be read out. */
  readonly announcement: Ref<string>
  onKeydown(event: KeyboardEvent): void
}

export interface CameraMoves {
  pan(dx: number, dy: number): void
  zoom(factor: number): void
  fit(): void
  showAll(): void
  release(): void
  /** What is in view, in words. */
  describe(): string
}

export const KEY_DEFAULTS = {
  /** Pixels of one press of an arrow key. */
  pan: 60,
  zoom: 1.35,
  /** Milliseconds without a key before what is in view is read out. */
  quiet: 500,
}

/** The camera by keyboard: arrows move, + and − zoom, 0 fits, Home shows the whole machine, Esc releases the focus. */
export function useCameraKeys(moves: CameraMoves): CameraKeys {
  const announcement = ref('')
  const { pan, zoom } = KEY_DEFAULTS
  const actions: Record<string, () => void> = {
    ArrowLeft: () => moves.pan(pan, 0),
    ArrowRight: () => moves.pan(-pan, 0),
    ArrowUp: () => moves.pan(0, pan),
    ArrowDown: () => moves.pan(0, -pan),
    '+': () => moves.zoom(zoom),
    '=': () => moves.zoom(zoom),
    '-': () => moves.zoom(1 / zoom),
    '0': moves.fit,
    Home: moves.showAll,
    Escape: moves.release,
  }
  let timer = 0
  onBeforeUnmount(() => window.clearTimeout(timer))

  return {
    announcement,
    onKeydown(event) {
      const action = actions[event.key]
      if (!action || event.ctrlKey || event.metaKey || event.altKey) return
      action()
      event.preventDefault()
      window.clearTimeout(timer)
      if (event.key === 'Escape') announcement.value = 'No chain in focus.'
      else timer = window.setTimeout(() => (announcement.value = moves.describe()), KEY_DEFAULTS.quiet)
    },
  }
}
