import { describe, expect, it } from 'vitest'
import type { ThemeName } from '../../../assets/css/tokens'
import { darkHues, lightHues, palettes } from '../../../assets/css/tokens'
import { loadColours } from '../../../utils/lattice/scene-chains'
import { POLES } from '../../../utils/problem/coefficient-scale'
import type { Light } from '../../support/vision'
import { closestPair, distanceSeen, oklabOf, VISIONS } from '../../support/vision'

/** OKLab distance that meanings on a lens keep, however they are seen; about 0.02 can just be noticed. */
const LEAST_BETWEEN_MEANINGS = 0.1
/** In high contrast grey and clay are both nearly as dark as ink, and told apart by dash, width and figure as well. */
const LEAST_IN_CONTRAST = 0.06

const WHITE: Light = [1, 1, 1]
const BLUE: Light = [0, 0, 1]

const isClose = (seen: Light, expected: Light): void => seen.forEach((v, i) => expect(v).toBeCloseTo(expected[i]!, 4))

describe('the simulation', () => {
  it.each(Object.entries(VISIONS))('%s leaves white and black alone', (_, see) => {
    isClose(see(WHITE), WHITE)
    isClose(see([0, 0, 0]), [0, 0, 0])
  })

  // Viénot, Brettel and Mollon keep white and the blue primary, and with them the plane of what dichromats see.
  it.each(['protan, Viénot', 'deutan, Viénot'])('%s keeps blue, and a second look changes nothing', (name) => {
    const see = VISIONS[name]!
    isClose(see(BLUE), BLUE)
    isClose(see(see([0.2, 0.7, 0.4])), see([0.2, 0.7, 0.4]))
  })

  it.each(Object.keys(VISIONS).filter((name) => /protan|deutan/.test(name)))(
    '%s brings red and green nearer',
    (name) => {
      const normal = distanceSeen('#c05030', '#5a8a30', VISIONS.normal!)
      expect(distanceSeen('#c05030', '#5a8a30', VISIONS[name]!)).toBeLessThan(normal / 1.5)
    },
  )

  it('tritan brings blue and green nearer, and leaves red and green apart', () => {
    const see = VISIONS['tritan, Machado']!
    expect(distanceSeen('#2060c0', '#208070', see)).toBeLessThan(
      distanceSeen('#2060c0', '#208070', VISIONS.normal!) / 1.5,
    )
    expect(distanceSeen('#c05030', '#5a8a30', see)).toBeGreaterThan(0.15)
  })

  // Ottosson’s own check: white is 1, 0, 0.
  it('measures in OKLab', () => isClose(oklabOf(WHITE), [1, 0, 0]))
})

describe.each(Object.keys(palettes) as ThemeName[])('colours of the %s theme, however they are seen', (theme) => {
  const { paper, ink, edge, clay, slate, ochre } = palettes[theme]
  const isDark = theme.endsWith('dark')
  const hues = isDark ? darkHues : lightHues
  const least = theme.startsWith('contrast') ? LEAST_IN_CONTRAST : LEAST_BETWEEN_MEANINGS

  it('occupancy: any two hues, so those of chains side by side, and the ground', () =>
    expect(closestPair({ ...hues, paper }).distance).toBeGreaterThanOrEqual(LEAST_BETWEEN_MEANINGS))

  it('load: empty, low, high and full', () =>
    expect(closestPair({ empty: paper, ...loadColours({ paper, slate, ochre }) }).distance).toBeGreaterThanOrEqual(
      least,
    ))

  it('breaks: chains that held, couplers that disagreed, spins and the ground', () =>
    expect(closestPair({ paper, held: edge, broken: clay, ink }).distance).toBeGreaterThanOrEqual(least))

  it('coefficients: negative, nought and positive', () =>
    expect(closestPair({ paper, nought: edge, ...POLES[isDark ? 'dark' : 'light'] }).distance).toBeGreaterThanOrEqual(
      least,
    ))
})
