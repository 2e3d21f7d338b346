const TAKES_KEYS = 'input, textarea, select, [contenteditable], [role="dialog"], [role="menu"]'

/** Runs an action at a key pressed anywhere on the page but where keys are typed. */
export function useShortcut(key: string, action: () => void) {
  const onKey = (event: KeyboardEvent): void => {
    const isTyping = event.target instanceof Element && event.target.closest(TAKES_KEYS) !== null
    if (event.key !== key || isTyping || event.ctrlKey || event.metaKey || event.altKey) return
    event.preventDefault()
    action()
  }
  onMounted(() => document.addEventListener('keydown', onKey))
  onBeforeUnmount(() => document.removeEventListener('keydown', onKey))
}
