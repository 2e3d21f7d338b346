import { palettes, type Palette } from '../../../assets/css/tokens'
import { themeInForce, watchTheme } from '../themes'

/** Colours for drawing; printed charts are always on light ground. */
export function currentPalette(printing = false): Palette {
  return palettes[printing ? 'light' : themeInForce()]
}

/** Calls back whenever the theme or the medium changes; returns how to stop. */
export function watchPalette(onChange: (palette: Palette) => void): () => void {
  const onScreen = () => onChange(currentPalette())
  const onPaper = () => onChange(currentPalette(true))
  const stop = watchTheme(onScreen)
  window.addEventListener('beforeprint', onPaper)
  window.addEventListener('afterprint', onScreen)
  return () => {
    stop()
    window.removeEventListener('beforeprint', onPaper)
    window.removeEventListener('afterprint', onScreen)
  }
}
