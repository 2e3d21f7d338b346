/**
 * Moves sight and focus to an element of the page by its id: a field itself, or the head of a section, which takes the
 * focus for that purpose only. False where there is none.
 */
export function goTo(id: string): boolean {
  const found = document.getElementById(id)
  if (!found) return false
  const folded = found.closest<HTMLDetailsElement>('details:not([open])')
  if (folded) folded.open = true
  const target = found.matches('input, select, textarea, button, a[href]')
    ? found
    : (found.querySelector<HTMLElement>('h2, h3') ?? found)
  if (target !== found && !target.hasAttribute('tabindex')) target.tabIndex = -1
  target.focus({ preventScroll: true })
  found.scrollIntoView({ block: 'start' })
  return true
}
