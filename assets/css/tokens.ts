/**
 * The colours of the workbook, once for each theme. Tailwind turns them into CSS variables of the same names;
 * charts and canvases may read the variables or these records. Hex only, so that any colour parser can read them.
 */
export const lightColours = {
  paper: '#FBFAF6',
  well: '#F4F1E8',
  tint: '#EBE7DA',
  field: '#FDFDFB',
  ink: '#1E2A26',
  ink2: '#55605A',
  edge: '#7C857F',
  hair: '#E6E2D6',
  rule: '#D8D3C4',
  pale: '#A0A6A0',
  leaf: '#1F5D4C',
  leafhover: '#1F5546',
  leafwash: '#E2ECE3',
  onleaf: '#FBFAF6',
  clay: '#B4532A',
  claytext: '#9C4422',
  claywash: '#F6E6DC',
  ochre: '#B98A1D',
  ochretext: '#7A5A0C',
  slate: '#3C5A78',
} as const

export type ColourName = keyof typeof lightColours
export type Palette = Readonly<Record<ColourName, string>>

export const darkColours: Palette = {
  paper: '#161C19',
  well: '#1D2421',
  tint: '#28312D',
  field: '#1D2421',
  ink: '#E9E6DC',
  ink2: '#A3ADA6',
  edge: '#6F7A73',
  hair: '#27302B',
  rule: '#36413B',
  pale: '#626B66',
  leaf: '#7FC4AC',
  leafhover: '#90C9B4',
  leafwash: '#203A31',
  onleaf: '#161C19',
  clay: '#E08A5C',
  claytext: '#E99B70',
  claywash: '#3A261C',
  ochre: '#D9B04A',
  ochretext: '#D9B04A',
  slate: '#93B4D6',
}

/** Hues of chains: told apart with normal and with deficient colour vision; none is near clay. */
export const lightHues = {
  mulberry: '#974E66',
  indigo: '#332F7E',
  cornflower: '#5C8CDA',
  aubergine: '#5A2C3C',
  lichen: '#91921F',
  rose: '#CA6789',
  moss: '#4C5A09',
  iris: '#4C62B3',
} as const

export type HueName = keyof typeof lightHues

export const darkHues: Readonly<Record<HueName, string>> = {
  mulberry: '#9E4F7E',
  indigo: '#8CAFFE',
  cornflower: '#B7DDFD',
  aubergine: '#C8787F',
  lichen: '#F0D777',
  rose: '#F09DA3',
  moss: '#617209',
  iris: '#6A81CE',
}

/** Declarations of one theme: `--paper`, …, `--hue-mulberry`, …. */
export function themeVariables(theme: 'light' | 'dark'): Record<string, string> {
  const colours = theme === 'light' ? lightColours : darkColours
  const hues = theme === 'light' ? lightHues : darkHues
  const declarations: Record<string, string> = { 'color-scheme': theme }
  for (const [name, value] of Object.entries(colours)) declarations[`--${name}`] = value
  for (const [name, value] of Object.entries(hues)) declarations[`--hue-${name}`] = value
  return declarations
}
