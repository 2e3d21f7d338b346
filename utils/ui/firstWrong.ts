/** So long an answer of the server may take to say which field is wrong. */
const PATIENCE_MS = 20_000

/** Moves the focus to the first control in it that is marked as wrong; false where none is. */
export function focusFirstWrong(within: ParentNode): boolean {
  const wrong = within.querySelector<HTMLElement>('[aria-invalid="true"]')
  if (!wrong) return false
  const folded = wrong.closest<HTMLDetailsElement>('details:not([open])')
  if (folded) folded.open = true
  wrong.focus()
  return true
}

/**
 * After a form was sent: moves the focus to the first field that turns out to be wrong, by the page's own check or by the
 * server's answer, unless the person went on to something else meanwhile. A newer call ends an older one.
 */
export function watchSubmitted(form: HTMLElement): () => void {
  const began = document.activeElement
  const stop = (): void => {
    observer.disconnect()
    clearTimeout(timer)
    form.removeEventListener('input', stop)
  }
  const look = (): void => {
    const now = document.activeElement
    const wentOn = now !== began && now !== document.body && now !== null
    if (wentOn || focusFirstWrong(form)) stop()
  }
  const observer = new MutationObserver(look)
  const timer = setTimeout(stop, PATIENCE_MS)
  observer.observe(form, { subtree: true, childList: true, attributes: true, attributeFilter: ['aria-invalid'] })
  form.addEventListener('input', stop, { once: true })
  // Marks that were there before stay as they are when the same mistake is sent again.
  requestAnimationFrame(() => requestAnimationFrame(look))
  return stop
}
