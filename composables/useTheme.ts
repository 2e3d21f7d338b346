import type { Ref } from 'vue'

export type Theme = 'system' | 'light' | 'dark'

const YEAR_SECONDS = 31_536_000

/** The theme a person chose on this device. A cookie, so that the server already writes the right page. */
export function useTheme(): Ref<Theme> {
  return useCookie<Theme>('espalier-theme', { default: () => 'system', maxAge: YEAR_SECONDS, sameSite: 'lax' })
}
