import type { Ref } from 'vue'
import { isThemeChoice, type ThemeChoice } from '~/utils/ui/themes'

const YEAR_SECONDS = 31_536_000

/** The theme a person chose on this device. A cookie, so that the server already writes the right page. */
export function useTheme(): Ref<ThemeChoice> {
  return useCookie<ThemeChoice>('espalier-theme', {
    default: () => 'system',
    decode: (value) => (isThemeChoice(value) ? value : 'system'),
    maxAge: YEAR_SECONDS,
    sameSite: 'lax',
  })
}
