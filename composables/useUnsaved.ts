import { onBeforeUnmount, onMounted } from 'vue'
import { onBeforeRouteLeave, onBeforeRouteUpdate } from 'vue-router'
import { useLeavingStore } from '~/stores/leaving'

/**
 * Keeps what was typed from being lost unasked, by a way within the application or by reloading and closing.
 *
 * @param isUnsaved whether leaving now would lose something
 * @param what what would be lost, to stand after “not saved:”, such as `the remark you typed`
 * @param keptWithin the text outlives pages, so that only reloading and closing would lose it
 */
export function useUnsaved(isUnsaved: () => boolean, what: string, { keptWithin = false } = {}): void {
  const { ask } = useLeavingStore()

  const mayLeave = (): boolean | Promise<boolean> => !isUnsaved() || ask(what)
  if (!keptWithin) {
    onBeforeRouteLeave(mayLeave)
    onBeforeRouteUpdate((to, from) => to.path === from.path || mayLeave())
  }

  const onUnload = (event: BeforeUnloadEvent): void => {
    if (isUnsaved()) event.preventDefault()
  }
  onMounted(() => window.addEventListener('beforeunload', onUnload))
  onBeforeUnmount(() => window.removeEventListener('beforeunload', onUnload))
}
