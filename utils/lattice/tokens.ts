import { HUES } from '~/utils/hues'

/** Colours of the theme in force, as `#rrggbb`. */
export interface Tokens {
  readonly paper: string
  readonly well: string
  readonly ink: string
  readonly ink2: string
  readonly edge: string
  readonly hair: string
  readonly rule: string
  readonly leaf: string
  readonly clay: string
  readonly claytext: string
  readonly claywash: string
  readonly ochre: string
  readonly slate: string
  /** Shade of each hue for this theme. */
  readonly hues: readonly string[]
  readonly isDark: boolean
}

type Name = Exclude<keyof Tokens, 'hues' | 'isDark'>

const LIGHT: Record<Name, string> = {
  paper: '#fbfaf6',
  well: '#f4f1e8',
  ink: '#1e2a26',
  ink2: '#55605a',
  edge: '#7c857f',
  hair: '#e7e2d6',
  rule: '#d9d4c5',
  leaf: '#1f5d4c',
  clay: '#b4532a',
  claytext: '#9c4422',
  claywash: '#f6e6dc',
  ochre: '#b98a1d',
  slate: '#3c5a78',
}

/**
 * Reads the theme's custom properties; a token that is not set falls back to its value in the light theme.
 *
 * @param valueOf value of a custom property such as `--paper`, empty when unset
 */
export function readTokens(valueOf: (property: string) => string): Tokens {
  const colours = { ...LIGHT }
  for (const name of Object.keys(LIGHT) as Name[]) colours[name] = parseColour(valueOf(`--${name}`)) ?? LIGHT[name]
  const isDark = lightness(colours.paper) < 0.5
  return { ...colours, isDark, hues: HUES.map((hue) => (isDark ? hue.dark : hue.light)) }
}

/** `#rgb`, `#rrggbb`, `rgb(r g b)`, or three bare numbers, as `#rrggbb`; null for anything else. */
export function parseColour(text: string): string | null {
  const value = text.trim().toLowerCase()
  const short = /^#([\da-f])([\da-f])([\da-f])$/.exec(value)
  if (short) return `#${short[1]}${short[1]}${short[2]}${short[2]}${short[3]}${short[3]}`
  if (/^#[\da-f]{6}$/.test(value)) return value
  const numbers = value
    .replace(/^rgba?\(/, '')
    .split(/[\s,/)]+/)
    .filter(Boolean)
    .slice(0, 3)
    .map(Number)
  if (numbers.length < 3 || numbers.some((n) => !(n >= 0 && n <= 255))) return null
  return `#${numbers.map((n) => Math.round(n).toString(16).padStart(2, '0')).join('')}`
}

export const channelsOf = (colour: string): [number, number, number] => [
  Number.parseInt(colour.slice(1, 3), 16),
  Number.parseInt(colour.slice(3, 5), 16),
  Number.parseInt(colour.slice(5, 7), 16),
]

/** Mixes two `#rrggbb` colours; share 0 gives the first. */
export function mixColours(first: string, second: string, share: number): string {
  const a = channelsOf(first)
  const b = channelsOf(second)
  return `#${a
    .map((v, i) =>
      Math.round(v + share * (b[i]! - v))
        .toString(16)
        .padStart(2, '0'),
    )
    .join('')}`
}

/** Perceived lightness, 0 … 1. */
function lightness(colour: string): number {
  const [r, g, b] = channelsOf(colour)
  return (0.299 * r + 0.587 * g + 0.114 * b) / 255
}

export const CALM_DEFAULTS = {
  /** Most contrast with paper of what steps back, and of the lines of free qubits. */
  rule: 2,
  hair: 1.6,
}

/**
 * Tokens for the lattice: chains that step back and free qubits stay behind those that matter, also in themes of high
 * contrast, in which rules are nearly as dark as text.
 */
export const calmed = (tokens: Tokens): Tokens => ({
  ...tokens,
  rule: towards(tokens.rule, tokens.paper, CALM_DEFAULTS.rule),
  hair: towards(tokens.hair, tokens.paper, CALM_DEFAULTS.hair),
})

/** The colour, or a mix with paper that has the contrast allowed. */
function towards(colour: string, paper: string, most: number): string {
  if (contrastOf(colour, paper) <= most) return colour
  let [low, high] = [0, 1]
  for (let step = 0; step < 12; step++) {
    const share = (low + high) / 2
    if (contrastOf(mixColours(colour, paper, share), paper) > most) low = share
    else high = share
  }
  return mixColours(colour, paper, high)
}

/** Contrast ratio of WCAG 2.2, 1 … 21. */
export function contrastOf(first: string, second: string): number {
  const [a, b] = [luminance(first), luminance(second)]
  return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05)
}

function luminance(colour: string): number {
  const [r, g, b] = channelsOf(colour).map((v) =>
    v <= 10.31475 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4,
  )
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!
}
