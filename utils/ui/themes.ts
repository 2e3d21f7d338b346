import type { ThemeName } from '../../assets/css/tokens'

/** What a person may choose: a theme, or what the system says. */
export type ThemeChoice = 'system' | ThemeName

export const THEME_CHOICES: readonly { key: ThemeChoice; label: string }[] = [
  { key: 'system', label: 'As the system' },
  { key: 'light', label: 'Light' },
  { key: 'dark', label: 'Dark' },
  { key: 'contrast-light', label: 'High contrast, light' },
  { key: 'contrast-dark', label: 'High contrast, dark' },
]

export const isThemeChoice = (value: unknown): value is ThemeChoice => THEME_CHOICES.some(({ key }) => key === value)

const DARK = '(prefers-color-scheme: dark)'
const CONTRAST = ['(prefers-contrast: more)', '(forced-colors: active)']

/** The theme that the style sheet shows, from `data-theme` on <html> and what the system asks for. */
export function themeShown(chosen: string | undefined, matches: (query: string) => boolean): ThemeName {
  if (chosen === 'contrast-light' || chosen === 'contrast-dark') return chosen
  const scheme = chosen === 'light' || chosen === 'dark' ? chosen : matches(DARK) ? 'dark' : 'light'
  return CONTRAST.some(matches) ? `contrast-${scheme}` : scheme
}

export const themeInForce = (): ThemeName =>
  themeShown(document.documentElement.dataset.theme, (query) => matchMedia(query).matches)

/** Calls back whenever the theme may have changed; returns how to stop. */
export function watchTheme(onChange: () => void): () => void {
  const media = [DARK, ...CONTRAST].map((query) => matchMedia(query))
  const observer = new MutationObserver(onChange)
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] })
  for (const query of media) query.addEventListener('change', onChange)
  return () => {
    observer.disconnect()
    for (const query of media) query.removeEventListener('change', onChange)
  }
}
