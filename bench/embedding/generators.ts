import { graphFromEdges } from '../../shared/engine/graph/build'
import type { Graph } from '../../shared/engine/graph/graph'
import type { Random } from '../../shared/engine/random'

/**
 * Random d-regular graph by the configuration model: d points a vertex are paired at random, then each loop and repeated
 * pair is switched with a random other pair until all are simple. Linear time for small d.
 */
export function regularGraph(n: number, degree: number, random: Random): Graph {
  if ((n * degree) % 2 !== 0 || degree >= n)
    throw new RangeError(`there is no ${degree}-regular graph of ${n} vertices`)
  const points = Int32Array.from({ length: n * degree }, (_, i) => i % n)
  for (let i = points.length - 1; i > 0; i--) {
    const j = random.below(i + 1)
    ;[points[i], points[j]] = [points[j]!, points[i]!]
  }
  const pairs = points.length / 2
  const counts = new Map<number, number>()
  const keyOf = (a: number, b: number): number => Math.min(a, b) * n + Math.max(a, b)
  const add = (a: number, b: number, by: number): void => {
    counts.set(keyOf(a, b), (counts.get(keyOf(a, b)) ?? 0) + by)
  }
  const isBad = (k: number): boolean => {
    const [a, b] = [points[2 * k]!, points[2 * k + 1]!]
    return a === b || counts.get(keyOf(a, b))! > 1
  }
  for (let k = 0; k < pairs; k++) add(points[2 * k]!, points[2 * k + 1]!, 1)
  let bad = Array.from({ length: pairs }, (_, k) => k).filter(isBad)
  while (bad.length > 0) {
    for (const k of bad) {
      const other = random.below(pairs)
      const [a, b] = [points[2 * k]!, points[2 * k + 1]!]
      const [c, d] = [points[2 * other]!, points[2 * other + 1]!]
      if (a === c || b === d || other === k || (counts.get(keyOf(a, c)) ?? 0) > 0 || (counts.get(keyOf(b, d)) ?? 0) > 0)
        continue
      add(a, b, -1)
      add(c, d, -1)
      points[2 * k + 1] = c
      points[2 * other] = b
      add(a, c, 1)
      add(b, d, 1)
    }
    bad = bad.filter(isBad)
  }
  return graphFromEdges(n, points)
}

/** Each pair joined with probability p (Erdős–Rényi). */
export function randomGraph(n: number, p: number, random: Random): Graph {
  const ends: number[] = []
  for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) if (random.float() < p) ends.push(i, j)
  return graphFromEdges(n, ends)
}

/** Complete graph K_n. */
export function completeGraph(n: number): Graph {
  const ends: number[] = []
  for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) ends.push(i, j)
  return graphFromEdges(n, ends)
}

/** Lattice of any number of dimensions, open at its sides. */
export function latticeGraph(...sides: readonly number[]): Graph {
  const order = sides.reduce((product, side) => product * side, 1)
  const ends: number[] = []
  for (let v = 0; v < order; v++) {
    let stride = 1
    for (const side of sides) {
      if (Math.floor(v / stride) % side < side - 1) ends.push(v, v + stride)
      stride *= side
    }
  }
  return graphFromEdges(order, ends)
}

/**
 * Travelling salesman over n cities with one variable for each city and place in the tour (Lucas, Ising formulations of
 * many NP problems, Front. Phys. 2:5, 2014): all of a city interact, all of a place interact, and different cities at
 * successive places of the closed tour do.
 */
export function tourGraph(n: number): Graph {
  const at = (city: number, place: number): number => city * n + (place % n)
  const ends: number[] = []
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      for (let k = j + 1; k < n; k++) ends.push(at(i, j), at(i, k), at(j, i), at(k, i))
      if (i !== j) for (let place = 0; place < n; place++) ends.push(at(i, place), at(j, place + 1))
    }
  }
  return graphFromEdges(n * n, ends)
}

/** The same graph with its vertices in random order, so that numbers tell nothing about places. */
export function shuffledGraph(graph: Graph, random: Random): Graph {
  const names = Uint32Array.from({ length: graph.order }, (_, i) => i)
  for (let i = graph.order - 1; i > 0; i--) {
    const j = random.below(i + 1)
    ;[names[i], names[j]] = [names[j]!, names[i]!]
  }
  return graphFromEdges(
    graph.order,
    Uint32Array.from(graph.ends, (v) => names[v]!),
  )
}
