import { onBeforeUnmount, onMounted, shallowRef } from 'vue'
import type { ShallowRef } from 'vue'
import { readTokens } from './tokens'
import type { Tokens } from './tokens'
import { watchTheme } from '../ui/themes'

/** Tokens of the theme in force, read again whenever the root element or the system's preference changes. */
export function useTokens(): Readonly<ShallowRef<Tokens>> {
  const tokens = shallowRef(readTokens(() => ''))
  let stop: (() => void) | undefined

  const read = () => {
    const style = getComputedStyle(document.documentElement)
    const next = readTokens((property) => style.getPropertyValue(property))
    if (JSON.stringify(next) !== JSON.stringify(tokens.value)) tokens.value = next
  }
  onMounted(() => {
    read()
    stop = watchTheme(read)
  })
  onBeforeUnmount(() => stop?.())
  return tokens
}
