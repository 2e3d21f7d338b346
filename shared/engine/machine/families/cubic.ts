import { graphFromEdges } from '../../graph/build'
import type { Fabric } from '../fabric'
import type { FamilyOf, FamilyRules } from './rules'

type Cubic = FamilyOf<'cubic'>
type Triple = readonly [number, number, number]

/** The axes as drawn: first to the right, second downwards, last aslant. The shortest is aslant, of equal ones the last. */
function drawnAxes(sides: Triple): Triple {
  const aslant = sides.lastIndexOf(Math.min(...sides))
  const [right, down] = [0, 1, 2].filter((axis) => axis !== aslant) as [number, number]
  return [right, down, aslant]
}

/**
 * Where the points lie. Every layer is a grid of its own, as wide-meshed as there are layers and one more, and moved by
 * (1, 1) against the one before: so no two points coincide, no coupler runs through a third point, and the couplers
 * between layers are the only slanting ones.
 */
function drawing(sides: Triple): (place: Triple) => readonly [number, number] {
  const [right, down, aslant] = drawnAxes(sides)
  const mesh = sides[aslant]! === 1 ? 1 : sides[aslant]! + 1
  return (place) => [mesh * place[right]! + place[aslant]!, mesh * place[down]! + place[aslant]!]
}

function buildCubic({ width, height, depth }: Cubic): Omit<Fabric, 'family'> {
  const order = width * height * depth
  const segments = new Float32Array(4 * order)
  const ends: number[] = []
  const placeOf = drawing([width, height, depth])
  let q = 0
  for (let z = 0; z < depth; z++)
    for (let y = 0; y < height; y++)
      for (let x = 0; x < width; x++, q++) {
        const [px, py] = placeOf([x, y, z])
        segments.set([px, py, px, py], 4 * q)
        if (x + 1 < width) ends.push(q, q + 1)
        if (y + 1 < height) ends.push(q, q + width)
        if (z + 1 < depth) ends.push(q, q + width * height)
      }
  return { graph: graphFromEdges(order, ends), ids: Uint32Array.from({ length: order }, (_, k) => k), segments }
}

/**
 * Cubic grid: points of a box joined to their neighbours along each axis, the Cartesian product of three paths. Number
 * (z·height + y)·width + x.
 */
export const cubic: FamilyRules<Cubic> = {
  sizes: [
    { field: 'width', least: 1 },
    { field: 'height', least: 1 },
    { field: 'depth', least: 1 },
  ],
  name: ({ width, height, depth }) => `cubic grid ${width}×${height}×${depth}`,
  qubitCount: ({ width, height, depth }) => width * height * depth,
  // Along each axis one fewer than its points, as often as there are lines along it.
  couplerCount: ({ width, height, depth }) =>
    3 * width * height * depth - width * height - width * depth - height * depth,
  build: buildCubic,
}
