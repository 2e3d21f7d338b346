import { describe, expect, it } from 'vitest'
import {
  contrastDarkColours,
  contrastLightColours,
  darkColours,
  darkHues,
  lightColours,
  lightHues,
  palettes,
  themeVariables,
  type Palette,
  type ThemeName,
} from '../../../../assets/css/tokens'

// Contrast as defined by WCAG 2.2, "contrast ratio" and "relative luminance".
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(hex.slice(at, at + 2), 16) / 255
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

function contrast(a: string, b: string): number {
  const [light = 0, dark = 0] = [luminance(a), luminance(b)].sort((x, y) => y - x)
  return (light + 0.05) / (dark + 0.05)
}

const themes: [string, Palette][] = [
  ['light', lightColours],
  ['dark', darkColours],
]

const TEXT_ON_GROUND = [
  ['ink', 'paper'],
  ['ink', 'well'],
  ['ink', 'leafwash'],
  ['ink', 'claywash'],
  ['ink2', 'paper'],
  ['ink2', 'well'],
  ['ink2', 'field'],
  ['ink2', 'leafwash'],
  ['leaf', 'paper'],
  ['leaf', 'leafwash'],
  ['onleaf', 'leaf'],
  ['onleaf', 'leafhover'],
  ['claytext', 'paper'],
  ['claytext', 'claywash'],
  ['ochretext', 'paper'],
  ['ochretext', 'well'],
  ['slate', 'paper'],
  ['slate', 'well'],
  ['paper', 'ink'],
] as const

describe.each(themes)('the %s theme', (_, colours) => {
  it.each(TEXT_ON_GROUND)('%s on %s can be read', (text, ground) => {
    expect(contrast(colours[text], colours[ground])).toBeGreaterThanOrEqual(4.5)
  })

  it.each([
    ['edge', 'paper'],
    ['edge', 'field'],
    ['clay', 'paper'],
    ['leaf', 'well'],
  ] as const)('%s on %s can be told apart', (mark, ground) => {
    expect(contrast(colours[mark], colours[ground])).toBeGreaterThanOrEqual(3)
  })
})

describe.each([
  ['light', contrastLightColours],
  ['dark', contrastDarkColours],
] as [string, Palette][])('the %s high-contrast theme', (_, colours) => {
  // WCAG 2.2, success criterion 1.4.6 (AAA).
  it.each(TEXT_ON_GROUND)('%s on %s can be read with ease', (text, ground) => {
    expect(contrast(colours[text], colours[ground])).toBeGreaterThanOrEqual(7)
  })

  it.each([
    ['edge', 'paper', 4.5],
    ['edge', 'field', 4.5],
    ['clay', 'paper', 4.5],
    ['ochre', 'paper', 4.5],
    ['rule', 'paper', 3],
    ['rule', 'well', 3],
    ['hair', 'paper', 3],
  ] as const)('%s on %s can be seen', (mark, ground, least) => {
    expect(contrast(colours[mark], colours[ground])).toBeGreaterThanOrEqual(least)
  })
})

it('every hue of chains can be told from paper', () => {
  for (const hue of Object.values(lightHues)) expect(contrast(hue, lightColours.paper)).toBeGreaterThanOrEqual(3)
  for (const hue of Object.values(darkHues)) expect(contrast(hue, darkColours.paper)).toBeGreaterThanOrEqual(3)
})

it('all themes set the same variables', () => {
  for (const theme of Object.keys(palettes) as ThemeName[])
    expect(Object.keys(themeVariables(theme))).toEqual(Object.keys(themeVariables('light')))
})
