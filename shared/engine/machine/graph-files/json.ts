/**
 * JSON graphs: `nodes`, and couplers as `links` or `edges`. A node is a number, or an object with `id` and optionally `x`
 * and `y`; a coupler is a pair of numbers, or an object with `source` and `target`. `positions` may give the places of
 * all nodes in their order, as in the file that this product writes. Where `directed` is true a coupler may be stated
 * once in each direction. Other members are passed over.
 */
import { ReadingFault } from '../../formats/format'
import { GraphCollector } from './collector'
import { qubitNumber, shown } from './graph-file'

type Members = Readonly<Record<string, unknown>>

const isObject = (value: unknown): value is Members =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** The line at which a parser stopped, from its message: a position, or a piece of the text that stands there alone. */
function lineOfFault(text: string, message: string): number | undefined {
  const position = /position (\d+)/.exec(message)
  const piece = /\.\.\."([^]*?)"(?:\.\.\.)? is not valid JSON/.exec(message)?.[1]
  const first = piece ? text.indexOf(piece) : -1
  const isAlone = first >= 0 && text.indexOf(piece!, first + 1) < 0
  const place = position ? Number(position[1]) : isAlone ? first + piece!.length : -1
  return place < 0 ? undefined : text.slice(0, place).split('\n').length
}

function parsed(text: string): Members {
  let document: unknown
  try {
    document = JSON.parse(text)
  } catch (error) {
    throw new ReadingFault('the file is no valid JSON', lineOfFault(text, String(error)))
  }
  if (!isObject(document)) throw new ReadingFault('the file must hold one object with nodes and links')
  return document
}

function listOf(document: Members, name: string): readonly unknown[] {
  const list = document[name]
  if (!Array.isArray(list)) throw new ReadingFault(`${name} must be a list, not ${shown(list)}`)
  return list
}

/** A coordinate: NaN where there is none, null where it is no finite number. */
function coordinate(value: unknown): number | null {
  if (value === undefined || value === null) return Number.NaN
  return typeof value === 'number' && Number.isFinite(value) ? value : null
}

function placeOf(node: unknown, position: unknown): readonly [unknown, unknown] {
  if (position !== undefined && position !== null)
    return Array.isArray(position) && position.length === 2 ? [position[0], position[1]] : [position, position]
  return isObject(node) ? [node.x, node.y] : [undefined, undefined]
}

function readNode(node: unknown, position: unknown, at: number, into: GraphCollector): void {
  const number = qubitNumber(isObject(node) ? node.id : node)
  if (typeof number === 'string') return into.reject('qubit', at, number)
  const [givenX, givenY] = placeOf(node, position)
  const [x, y] = [coordinate(givenX), coordinate(givenY)]
  if (x === null || y === null || Number.isNaN(x) !== Number.isNaN(y))
    return into.reject('qubit', at, `the position of qubit ${number} must be two finite numbers`)
  into.addQubit(number, at, x, y)
}

function readLink(link: unknown, at: number, into: GraphCollector): void {
  const pair: readonly unknown[] = isObject(link) ? [link.source, link.target] : Array.isArray(link) ? link : []
  if (pair.length !== 2) return into.reject('coupler', at, `${shown(link)} is no pair of qubits`)
  const [a, b] = pair.map(qubitNumber)
  for (const fault of [a, b]) if (typeof fault === 'string') return into.reject('coupler', at, fault)
  into.addCoupler(a as number, b as number, at)
}

/** @throws ReadingFault where the file is no such document */
export function readJsonGraph(text: string): GraphCollector {
  const document = parsed(text)
  const named = ['links', 'edges'].filter((name) => document[name] !== undefined)
  if (named.length !== 1) throw new ReadingFault('couplers must be listed under links or edges, and not under both')
  const [nodes, links] = [listOf(document, 'nodes'), listOf(document, named[0]!)]
  const positions = document.positions === undefined ? [] : listOf(document, 'positions')
  if (positions.length > 0 && positions.length !== nodes.length)
    throw new ReadingFault(`there are ${nodes.length} nodes and ${positions.length} positions`)
  const collector = new GraphCollector(true, (what, at) => ({
    place: `${what === 'qubit' ? 'nodes' : named[0]!}[${at}]`,
  }))
  collector.isDirected = document.directed === true
  nodes.forEach((node, at) => readNode(node, positions[at], at, collector))
  links.forEach((link, at) => readLink(link, at, collector))
  return collector
}
