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

/** High contrast: text at 7:1 and more, and the rules, mere decoration elsewhere, can be seen too. */
export const contrastLightColours: Palette = {
  paper: '#FFFFFF',
  well: '#F5F5F2',
  tint: '#E6E6E0',
  field: '#FFFFFF',
  ink: '#000000',
  ink2: '#2B332F',
  edge: '#3F4A44',
  hair: '#8C948F',
  rule: '#6F7873',
  pale: '#6A736E',
  leaf: '#064A39',
  leafhover: '#00352A',
  leafwash: '#DCEBE2',
  onleaf: '#FFFFFF',
  clay: '#8A3210',
  claytext: '#7A2A0A',
  claywash: '#FBE9DF',
  ochre: '#8A6200',
  ochretext: '#5C4100',
  slate: '#1D3C5E',
}

export const contrastDarkColours: Palette = {
  paper: '#000000',
  well: '#0D1210',
  tint: '#232B27',
  field: '#0A0E0C',
  ink: '#FFFFFF',
  ink2: '#D6DDD8',
  edge: '#B4BDB7',
  hair: '#6B746F',
  rule: '#858E89',
  pale: '#8A938E',
  leaf: '#8FE6C8',
  leafhover: '#B5F2DC',
  leafwash: '#0F3A2D',
  onleaf: '#000000',
  clay: '#FF9F6E',
  claytext: '#FFB48C',
  claywash: '#3A1B0A',
  ochre: '#FFD24D',
  ochretext: '#FFD966',
  slate: '#B5D6FA',
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

export const palettes = {
  light: lightColours,
  dark: darkColours,
  'contrast-light': contrastLightColours,
  'contrast-dark': contrastDarkColours,
} satisfies Record<string, Palette>

export type ThemeName = keyof typeof palettes

/** Declarations of one theme: `--paper`, …, `--hue-mulberry`, …, and what lies over the page behind a dialog. */
export function themeVariables(theme: ThemeName): Record<string, string> {
  const isDark = theme.endsWith('dark')
  const hues = isDark ? darkHues : lightHues
  const declarations: Record<string, string> = {
    'color-scheme': isDark ? 'dark' : 'light',
    '--veil': isDark ? 'rgb(0 0 0 / 0.6)' : 'rgb(30 42 38 / 0.32)',
  }
  for (const [name, value] of Object.entries(palettes[theme])) declarations[`--${name}`] = value
  for (const [name, value] of Object.entries(hues)) declarations[`--hue-${name}`] = value
  return declarations
}
