import { ReadingFault } from '../../formats/format'
import { isBanner } from '../../formats/matrix-market-header'
import { holdsText, textOf } from '../../formats/text'
import type { GraphCollector } from './collector'
import { readEdgeList } from './edge-list'
import type { GraphControl, GraphFormat, GraphReading } from './graph-file'
import { readGraphml } from './graphml'
import { readJsonGraph } from './json'
import { readMatrixMarket } from './matrix-market'

/** Enough to see what a file is. */
const HEAD_BYTES = 4096

/** What the beginning of a file looks like. */
export function detectGraphFormat(bytes: Uint8Array): GraphFormat {
  const head = textOf(bytes.subarray(0, HEAD_BYTES))
    .replace(/^\uFEFF/, '')
    .trimStart()
  if (isBanner(head)) return 'matrix-market'
  if (head.startsWith('<')) return 'graphml'
  return head.startsWith('{') || head.startsWith('[') ? 'json' : 'edge-list'
}

/** @throws ReadingFault for bytes that are no UTF-8 */
function wholeText(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    throw new ReadingFault('the file is not UTF-8 text: save it as UTF-8')
  }
}

function collect(bytes: Uint8Array, format: GraphFormat, control?: GraphControl): GraphCollector {
  switch (format) {
    case 'edge-list':
      return readEdgeList(bytes, control)
    case 'matrix-market':
      return readMatrixMarket(bytes, control)
    case 'graphml':
      return readGraphml(wholeText(bytes))
    case 'json':
      return readJsonGraph(wholeText(bytes))
  }
}

/**
 * Reads a machine graph from a file (docs/machine-files.md): a simple graph whose vertices are qubit numbers, with a
 * position for all of them or for none. Nothing is repaired: whatever is wrong is named, and then there is no graph.
 * @param format how to read it; looked for in the content where left out
 */
export function readGraphFile(
  bytes: Uint8Array,
  { format: given, control }: { readonly format?: GraphFormat; readonly control?: GraphControl } = {},
): GraphReading {
  const format = given ?? detectGraphFormat(bytes)
  const about = { format, formatSource: given ? ('given' as const) : ('detected' as const) }
  try {
    if (!holdsText(bytes.subarray(0, HEAD_BYTES))) throw new ReadingFault('the file is not text in UTF-8')
    const collector = collect(bytes, format, control)
    const graph = collector.finish()
    return { ...about, graph, issues: collector.issues, issueCount: collector.issueCount }
  } catch (error) {
    if (!(error instanceof ReadingFault)) throw error
    const { message, line } = error
    return { ...about, graph: null, issues: [line === undefined ? { message } : { line, message }], issueCount: 1 }
  }
}
