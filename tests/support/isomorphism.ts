/** A simple graph as lists of neighbours. */
export type Neighbours = readonly (readonly number[])[]

/** @param edges pairs of vertices 0 … order − 1; each pair once */
export function neighboursOf(order: number, edges: Iterable<readonly [number, number]>): number[][] {
  const lists = Array.from({ length: order }, (): number[] => [])
  for (const [a, b] of edges) {
    lists[a]!.push(b)
    lists[b]!.push(a)
  }
  return lists
}

/** Every pair of `items` for which `joins` holds. */
export function graphBy<T>(items: readonly T[], joins: (a: T, b: T) => boolean): number[][] {
  const edges: [number, number][] = []
  for (let a = 0; a < items.length; a++)
    for (let b = a + 1; b < items.length; b++) if (joins(items[a]!, items[b]!)) edges.push([a, b])
  return neighboursOf(items.length, edges)
}

/** Splits colours by the colours around until nothing changes; both graphs share the names of colours. */
function refined(graphs: readonly Neighbours[], colours: readonly number[][]): number[][] {
  let current = colours.map((list) => [...list])
  for (let classes = 0; ;) {
    const names = new Map<string, number>()
    const next = graphs.map((graph, g) =>
      graph.map((around, v) => {
        const seen = around.map((w) => current[g]![w]!).sort((a, b) => a - b)
        const key = `${current[g]![v]}:${seen.join()}`
        if (!names.has(key)) names.set(key, names.size)
        return names.get(key)!
      }),
    )
    if (names.size === classes) return next
    classes = names.size
    current = next
  }
}

const sorted = (colours: readonly number[]): string => [...colours].sort((a, b) => a - b).join()

/** A colour that several vertices share, with the fewest of them; null when all differ. */
function smallestShared(colours: readonly number[]): number | null {
  const counts = new Map<number, number>()
  for (const colour of colours) counts.set(colour, (counts.get(colour) ?? 0) + 1)
  const shared = [...counts].filter(([, count]) => count > 1).sort((a, b) => a[1] - b[1])
  return shared[0]?.[0] ?? null
}

function matches(a: Neighbours, b: Neighbours, [coloursA, coloursB]: readonly number[][]): boolean {
  const place = new Map(coloursB!.map((colour, w) => [colour, w]))
  const image = coloursA!.map((colour) => place.get(colour)!)
  return a.every((around, v) => around.every((w) => b[image[v]!]!.includes(image[w]!)))
}

function search(a: Neighbours, b: Neighbours, colours: readonly number[][]): boolean {
  const now = refined([a, b], colours)
  if (sorted(now[0]!) !== sorted(now[1]!)) return false
  const shared = smallestShared(now[0]!)
  if (shared === null) return matches(a, b, now)
  const fresh = a.length + 1
  const first = now[0]!.indexOf(shared)
  const marked = (list: readonly number[], v: number): number[] => list.map((colour, w) => (w === v ? fresh : colour))
  return now[1]!.some((colour, w) => colour === shared && search(a, b, [marked(now[0]!, first), marked(now[1]!, w)]))
}

/**
 * Whether two graphs are the same but for the names of their vertices: exact, by colour refinement and, where that
 * leaves vertices alike, by trying one after the other.
 */
export function isIsomorphic(a: Neighbours, b: Neighbours): boolean {
  const count = (graph: Neighbours): number => graph.reduce((sum, around) => sum + around.length, 0)
  if (a.length !== b.length || count(a) !== count(b)) return false
  return search(a, b, [a.map(() => 0), b.map(() => 0)])
}
