import type { GraphFormat } from './engine/machine/graph-files/graph-file'

/** The files that a machine graph is read from, as the pages and messages tell of them (docs/machine-files.md). */
export const GRAPH_FILES: Readonly<
  Record<GraphFormat, { readonly title: string; readonly name: string; readonly about: string }>
> = {
  'edge-list': {
    title: 'Edge list',
    name: 'an edge list',
    about: 'A coupler a line as two qubit numbers; a number alone is a qubit without couplers.',
  },
  'matrix-market': {
    title: 'Matrix Market',
    name: 'a Matrix Market file',
    about: 'A coordinate matrix, general or symmetric; row i is qubit i − 1.',
  },
  graphml: { title: 'GraphML', name: 'GraphML', about: 'Nodes and edges; data named x and y are positions.' },
  json: {
    title: 'JSON',
    name: 'a JSON graph',
    about: 'Nodes and links, with x and y for positions; also the file that a machine’s graph is taken out as.',
  },
}

export const GRAPH_FILE_ENDINGS = ['.csv', '.tsv', '.txt', '.edges', '.mtx', '.graphml', '.xml', '.json']

export const GRAPH_FILE_LIMITS = { sentBytes: 64 * 2 ** 20, sheetBytes: 16 * 2 ** 20 }
