/**
 * GraphML (Brandes, Eiglsperger, Herman, Himsolt & Marshall, GD 2001): one graph of nodes and edges. Positions are the
 * data of the keys named x and y. Where edges are directed by default a coupler may stand once in each direction.
 */
import { ReadingFault } from '../../formats/format'
import { GraphCollector } from './collector'
import { qubitNumber, shown } from './graph-file'
import type { XmlHandler } from './xml'
import { readXml } from './xml'

type Attributes = ReadonlyMap<string, string>

interface Node {
  readonly number: number
  readonly line: number
  x: number
  y: number
}

class GraphmlHandler implements XmlHandler {
  readonly collector = new GraphCollector(true, (_, line) => ({ line }))
  private readonly axes = new Map<string, 'x' | 'y'>()
  private readonly path: string[] = []
  private graphs = 0
  private node: Node | null = null
  private axis: 'x' | 'y' | null = null
  private data = ''

  open(name: string, attributes: Attributes, line: number): void {
    if (this.path.length === 0 && name !== 'graphml')
      throw new ReadingFault(`the outermost element must be graphml, not ${shown(name)}`, line)
    const inside = this.path.at(-1)
    this.path.push(name)
    if (name === 'key') this.openKey(attributes)
    else if (name === 'graph') this.openGraph(attributes, line)
    else if (name === 'hyperedge') throw new ReadingFault('a hyperedge joins more than two qubits', line)
    else if (name === 'node' && inside === 'graph') this.openNode(attributes, line)
    else if (name === 'edge' && inside === 'graph') this.openEdge(attributes, line)
    else if (name === 'data' && inside === 'node') this.openData(attributes)
  }

  private openKey(attributes: Attributes): void {
    const name = attributes.get('attr.name')?.toLowerCase()
    const domain = attributes.get('for') ?? 'all'
    if ((name === 'x' || name === 'y') && (domain === 'node' || domain === 'all'))
      this.axes.set(attributes.get('id') ?? '', name)
  }

  private openGraph(attributes: Attributes, line: number): void {
    if (++this.graphs > 1) throw new ReadingFault('the file holds more than one graph', line)
    this.collector.isDirected = attributes.get('edgedefault') === 'directed'
  }

  private openNode(attributes: Attributes, line: number): void {
    const number = qubitNumber(attributes.get('id'))
    if (typeof number === 'string') return this.collector.reject('qubit', line, number)
    this.node = { number, line, x: Number.NaN, y: Number.NaN }
  }

  private openEdge(attributes: Attributes, line: number): void {
    const [a, b] = ['source', 'target'].map((end) => qubitNumber(attributes.get(end)))
    for (const fault of [a, b]) if (typeof fault === 'string') return this.collector.reject('coupler', line, fault)
    this.collector.addCoupler(a as number, b as number, line)
  }

  private openData(attributes: Attributes): void {
    this.axis = this.axes.get(attributes.get('key') ?? '') ?? null
    this.data = ''
  }

  text(text: string): void {
    if (this.axis) this.data += text
  }

  close(name: string, line: number): void {
    this.path.pop()
    if (name === 'data' && this.axis) this.closeData(line)
    if (name === 'node' && this.path.at(-1) === 'graph') this.closeNode()
  }

  private closeData(line: number): void {
    const value = this.data.trim() === '' ? Number.NaN : Number(this.data)
    if (!Number.isFinite(value))
      this.collector.reject('qubit', line, `the position ${shown(this.data.trim())} is not a finite number`)
    else if (this.node) this.node[this.axis!] = value
    this.axis = null
  }

  private closeNode(): void {
    if (!this.node) return
    const { number, line, x, y } = this.node
    this.node = null
    if (Number.isNaN(x) !== Number.isNaN(y))
      this.collector.reject('qubit', line, `the position of qubit ${number} has only one of x and y`)
    else this.collector.addQubit(number, line, x, y)
  }
}

/** @throws ReadingFault where the text is no such document */
export function readGraphml(text: string): GraphCollector {
  const handler = new GraphmlHandler()
  readXml(text, handler)
  return handler.collector
}
