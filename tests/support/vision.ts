/*
 * Colours as people with a deficiency of colour vision see them. Colours are `#rrggbb`; light is linear RGB, 0 … 1.
 */

export type Light = readonly [number, number, number]
type Matrix = readonly [Light, Light, Light]

const times = (matrix: Matrix, [r, g, b]: Light): Light => {
  const row = ([x, y, z]: Light): number => x * r + y * g + z * b
  return [row(matrix[0]), row(matrix[1]), row(matrix[2])]
}

/** The transfer function of sRGB, IEC 61966-2-1, and its inverse. */
const toLinear = (v: number): number => (v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4)

export function lightOf(colour: string): Light {
  const channel = (at: number): number => toLinear(Number.parseInt(colour.slice(at, at + 2), 16) / 255)
  return [channel(1), channel(3), channel(5)]
}

/*
 * F. Viénot, H. Brettel, J. D. Mollon, “Digital video colourmaps for checking the legibility of displays by dichromats”,
 * Color Research and Application 24 (1999): cone responses of a display’s primaries, and for a missing L or M cone the
 * response that keeps white and the blue primary as they are. The slight shrinking of the gamut is left out.
 * From memory; the test beside checks what the matrices must keep.
 */
const CONES: Matrix = [
  [17.8824, 43.5161, 4.11935],
  [3.45565, 27.1554, 3.86714],
  [0.0299566, 0.184309, 1.46709],
]
const WITHOUT_L: Matrix = [
  [0, 2.02344, -2.52581],
  [0, 1, 0],
  [0, 0, 1],
]
const WITHOUT_M: Matrix = [
  [1, 0, 0],
  [0.494207, 0, 1.24827],
  [0, 0, 1],
]

/*
 * G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, “A physiologically-based model for simulation of color vision
 * deficiency”, IEEE Transactions on Visualization and Computer Graphics 15 (2009), table of severity 1.0. From memory.
 */
const MACHADO = {
  protan: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deutan: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritan: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
} as const satisfies Record<string, Matrix>

function inverse([[a, b, c], [d, e, f], [g, h, i]]: Matrix): Matrix {
  const determinant = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g)
  const part = (x: number): number => x / determinant
  return [
    [part(e * i - f * h), part(c * h - b * i), part(b * f - c * e)],
    [part(f * g - d * i), part(a * i - c * g), part(c * d - a * f)],
    [part(d * h - e * g), part(b * g - a * h), part(a * e - b * d)],
  ]
}

const INVERSE_CONES = inverse(CONES)
const vienot = (without: Matrix) => (light: Light) => times(INVERSE_CONES, times(without, times(CONES, light)))
const machado = (kind: keyof typeof MACHADO) => (light: Light) => times(MACHADO[kind], light)

/** Ways of seeing: unimpaired, and two models of each deficiency where there are two. */
export const VISIONS: Readonly<Record<string, (light: Light) => Light>> = {
  normal: (light) => light,
  'protan, Viénot': vienot(WITHOUT_L),
  'deutan, Viénot': vienot(WITHOUT_M),
  'protan, Machado': machado('protan'),
  'deutan, Machado': machado('deutan'),
  'tritan, Machado': machado('tritan'),
}

/** B. Ottosson, “A perceptual color space for image processing” (2020): OKLab. */
const TO_CUBES: Matrix = [
  [0.4122214708, 0.5363325363, 0.0514459929],
  [0.2119034982, 0.6806995451, 0.1073969566],
  [0.0883024619, 0.2817188376, 0.6299787005],
]
const TO_OKLAB: Matrix = [
  [0.2104542553, 0.793617785, -0.0040720468],
  [1.9779984951, -2.428592205, 0.4505937099],
  [0.0259040371, 0.7827717662, -0.808675766],
]

/** Lightness and the two opponent axes; light outside what a display shows is cut off first. */
export function oklabOf(light: Light): Light {
  const shown = light.map((v) => Math.min(1, Math.max(0, v))) as unknown as Light
  const [l, m, s] = times(TO_CUBES, shown)
  return times(TO_OKLAB, [Math.cbrt(l), Math.cbrt(m), Math.cbrt(s)])
}

/** OKLab distance of two colours as they are seen. 0.02 is about what can just be noticed side by side. */
export function distanceSeen(first: string, second: string, see: (light: Light) => Light): number {
  const a = oklabOf(see(lightOf(first)))
  const b = oklabOf(see(lightOf(second)))
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2])
}

export interface Closest {
  readonly distance: number
  readonly pair: readonly [string, string]
  readonly vision: string
}

/** The pair of named colours that is hardest to tell apart, over all ways of seeing. */
export function closestPair(colours: Readonly<Record<string, string>>): Closest {
  const names = Object.keys(colours)
  let closest: Closest = { distance: Infinity, pair: ['', ''], vision: '' }
  for (const [vision, see] of Object.entries(VISIONS))
    names.forEach((one, i) =>
      names.slice(i + 1).forEach((other) => {
        const distance = distanceSeen(colours[one]!, colours[other]!, see)
        if (distance < closest.distance) closest = { distance, pair: [one, other], vision }
      }),
    )
  return closest
}
