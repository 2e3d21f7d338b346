import { describe, expect, it } from 'vitest'
import { GRAPH_FORMATS } from '../../../../../shared/engine/machine/graph-files/graph-file'
import type { GraphReading } from '../../../../../shared/engine/machine/graph-files/graph-file'
import { drawnSegments, segmentsAt } from '../../../../../shared/engine/machine/graph-files/places'
import { readGraphFile } from '../../../../../shared/engine/machine/graph-files/read-graph-file'
import type { Random } from '../../../../../shared/engine/random'
import { createRandom } from '../../../../../shared/engine/random'
import { mutated } from '../../../../fixtures/problems/mutations'

/** A graph of a few qubits in every writing. */
function seedTexts(random: Random): string[] {
  const ids = [...new Set(Array.from({ length: 2 + random.below(6) }, () => random.below(40)))].sort((a, b) => a - b)
  const pairs = ids.flatMap((a, i) => ids.slice(i + 1).flatMap((b) => (random.below(2) ? [[a, b] as const] : [])))
  const at = (k: number): readonly [number, number] => [k * 1.5, k * k]
  const node = (id: number, k: number): string =>
    `<node id="${id}"><data key="d0">${at(k)[0]}</data><data key="d1">${at(k)[1]}</data></node>`
  const dense = pairs.map(([a, b]) => `${ids.indexOf(b) + 1} ${ids.indexOf(a) + 1}`)
  return [
    `a,b\n${pairs.map(([a, b]) => `${a},${b}`).join('\n')}\n${ids.join('\n')}\n`,
    `%%MatrixMarket matrix coordinate pattern symmetric\n${ids.length} ${ids.length} ${dense.length}\n${dense.join('\n')}\n`,
    `<graphml><key id="d0" attr.name="x"/><key id="d1" attr.name="y"/><graph>${ids.map(node).join('\n')}${pairs
      .map(([a, b]) => `<edge source="${a}" target="${b}"/>`)
      .join('')}</graph></graphml>`,
    JSON.stringify({
      nodes: ids.map((id, k) => ({ id, x: at(k)[0], y: at(k)[1] })),
      links: pairs.map(([source, target]) => ({ source, target })),
    }),
    JSON.stringify({ nodes: ids, edges: pairs, positions: ids.map((_, k) => at(k)) }),
  ]
}

/** What is wrong with a reading that came of hostile bytes, or null. */
function faultOf({ graph, issues, issueCount }: GraphReading): string | null {
  if (issues.length > 100 || issueCount < issues.length) return 'issues'
  if (!graph) return issues.length > 0 ? null : 'no graph and no reason'
  if (issueCount > 0) return 'a graph in spite of issues'
  const { ids, ends, positions } = graph
  if (ids.length < 1 || ids.some((id, k) => k > 0 && id <= ids[k - 1]!)) return 'numbers'
  for (let k = 0; k < ends.length; k += 2) {
    if (!(ends[k]! < ends[k + 1]! && ends[k + 1]! < ids.length)) return `coupler ${k / 2} is out of range`
    if (k > 0 && ends[k - 2]! * ids.length + ends[k - 1]! >= ends[k]! * ids.length + ends[k + 1]!) return 'order'
  }
  if (positions && (positions.length !== 2 * ids.length || !positions.every(Number.isFinite))) return 'positions'
  const segments = positions ? segmentsAt(positions) : drawnSegments(graph)
  if (typeof segments === 'string') return null
  const places = new Set(Array.from(ids, (_, q) => `${segments[4 * q]},${segments[4 * q + 1]}`))
  return segments.every(Number.isFinite) && places.size === ids.length ? null : 'places'
}

describe('six thousand damaged graph files', () => {
  it('never crash, and never give half a graph', () => {
    const random = createRandom(1913)
    let readable = 0
    for (let round = 0; round < 6000; round++) {
      const texts = seedTexts(random)
      const bytes = mutated(new TextEncoder().encode(texts[round % texts.length]), random)
      const format = random.below(4) === 0 ? GRAPH_FORMATS[random.below(GRAPH_FORMATS.length)] : undefined
      const where = `round ${round}, ${format ?? 'detected'}: ${Buffer.from(bytes).toString('base64')}`
      let reading: GraphReading
      try {
        reading = readGraphFile(bytes, { format })
      } catch (error) {
        throw new Error(where, { cause: error })
      }
      const fault = faultOf(reading)
      if (fault) throw new Error(`${fault}: ${where}`)
      if (reading.graph) readable++
    }
    // Damage that leaves a graph is read, so that the checks above had something to look at.
    expect(readable).toBeGreaterThan(300)
  })

  it('read the same graph from every writing when undamaged', () => {
    const random = createRandom(7)
    for (let round = 0; round < 100; round++) {
      const texts = seedTexts(random)
      const graphs = texts.map((text) => readGraphFile(new TextEncoder().encode(text)).graph!)
      for (const k of [2, 3, 4]) expect(graphs[k]!.ids).toEqual(graphs[0]!.ids)
      for (const graph of graphs) expect(graph.ends).toEqual(graphs[0]!.ends)
      for (const k of [3, 4]) expect(graphs[k]!.positions).toEqual(graphs[2]!.positions)
    }
  })
})
