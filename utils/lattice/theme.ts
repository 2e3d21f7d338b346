import { onBeforeUnmount, onMounted, shallowRef } from 'vue'
import type { ShallowRef } from 'vue'
import { readTokens } from './tokens'
import type { Tokens } from './tokens'

/** Tokens of the theme in force, read again whenever the root element or the system's preference changes. */
export function useTokens(): Readonly<ShallowRef<Tokens>> {
  const tokens = shallowRef(readTokens(() => ''))
  let observer: MutationObserver | null = null
  let scheme: MediaQueryList | null = null

  const read = () => {
    const style = getComputedStyle(document.documentElement)
    const next = readTokens((property) => style.getPropertyValue(property))
    if (JSON.stringify(next) !== JSON.stringify(tokens.value)) tokens.value = next
  }
  onMounted(() => {
    read()
    observer = new MutationObserver(read)
    observer.observe(document.documentElement, { attributes: true, attributeFilter: ['class', 'data-theme', 'style'] })
    scheme = matchMedia('(prefers-color-scheme: dark)')
    scheme.addEventListener('change', read)
  })
  onBeforeUnmount(() => {
    observer?.disconnect()
    scheme?.removeEventListener('change', read)
  })
  return tokens
}
