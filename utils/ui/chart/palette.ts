import { darkColours, lightColours, type Palette } from '../../../assets/css/tokens'

/** Whether the page is dark now: the system decides unless <html> says otherwise. */
export function isDark(): boolean {
  const chosen = document.documentElement.dataset.theme
  if (chosen === 'dark' || chosen === 'light') return chosen === 'dark'
  return window.matchMedia('(prefers-color-scheme: dark)').matches
}

/** Colours for drawing; printed charts are always on light ground. */
export function currentPalette(printing = false): Palette {
  return !printing && isDark() ? darkColours : lightColours
}

/** Calls back whenever the theme or the medium changes; returns how to stop. */
export function watchPalette(onChange: (palette: Palette) => void): () => void {
  const media = window.matchMedia('(prefers-color-scheme: dark)')
  const observer = new MutationObserver(() => onChange(currentPalette()))
  const onScreen = () => onChange(currentPalette())
  const onPaper = () => onChange(currentPalette(true))
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] })
  media.addEventListener('change', onScreen)
  window.addEventListener('beforeprint', onPaper)
  window.addEventListener('afterprint', onScreen)
  return () => {
    observer.disconnect()
    media.removeEventListener('change', onScreen)
    window.removeEventListener('beforeprint', onPaper)
    window.removeEventListener('afterprint', onScreen)
  }
}
