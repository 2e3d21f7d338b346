import { palettes, type Palette } from '../../../assets/css/tokens'
import { themeInForce, watchTheme } from '../themes'

/** Colours for drawing; printed charts are always on light ground. */
export function currentPalette(printing = false): Palette {
  return palettes[printing ? 'light' : themeInForce()]
}

/** Calls back whenever the theme or the medium changes; returns how to stop. */
export function watchPalette(onChange: (palette: Palette, isPrinting: boolean) => void): () => void {
  const onScreen = () => onChange(currentPalette(), false)
  const onPaper = () => onChange(currentPalette(true), true)
  const medium = matchMedia('print')
  const onMedium = () => (medium.matches ? onPaper() : onScreen())
  const stop = watchTheme(onScreen)
  medium.addEventListener('change', onMedium)
  window.addEventListener('beforeprint', onPaper)
  window.addEventListener('afterprint', onScreen)
  return () => {
    stop()
    medium.removeEventListener('change', onMedium)
    window.removeEventListener('beforeprint', onPaper)
    window.removeEventListener('afterprint', onScreen)
  }
}
