/** A machine graph as it works: everything by dense index but `ids`, the published numbers. */
export interface WorkingParts {
  /** Ascending. Length: qubits as made. */
  readonly ids: Uint32Array
  /** Where each qubit lies, see `Fabric`. Length four times that of `ids`. */
  readonly segments: Float32Array
  /** 1 where the qubit works. */
  readonly usable: Uint8Array
  /** Working couplers, see `Graph`. */
  readonly ends: Uint32Array
}

/** `json` holds `{nodes, edges, positions}`; `csv` a row a coupler; `mtx` a symmetric Matrix Market pattern. */
export type WrittenFormat = 'json' | 'csv' | 'mtx'

/** The working qubits and couplers as a file that `readGraphFile` takes, by published number, in ascending order. */
export function writeGraphFile(parts: WorkingParts, format: WrittenFormat): string {
  if (format === 'json') return jsonOf(parts)
  if (format === 'csv') return `a,b\n${rowsOf(parts, (a, b) => `${a},${b}\n`)}`
  const side = parts.ids[parts.ids.length - 1]! + 1
  const head = '%%MatrixMarket matrix coordinate pattern symmetric\n% row and column = qubit number + 1\n'
  const rows = rowsOf(parts, (a, b) => `${b + 1} ${a + 1}\n`)
  return `${head}${side} ${side} ${parts.ends.length / 2}\n${rows}`
}

/** The couplers one after the other; `text` writes the one between qubits `a` < `b`. */
function rowsOf({ ids, ends }: WorkingParts, text: (a: number, b: number) => string): string {
  let rows = ''
  for (let at = 0; at < ends.length; at += 2) rows += text(ids[ends[at]!]!, ids[ends[at + 1]!]!)
  return rows
}

/** A qubit is placed in the middle of its segment. */
function jsonOf(parts: WorkingParts): string {
  const { ids, segments, usable } = parts
  const nodes: number[] = []
  const positions: string[] = []
  usable.forEach((works, q) => {
    if (!works) return
    const [x1, y1, x2, y2] = segments.subarray(4 * q, 4 * q + 4) as unknown as [number, number, number, number]
    nodes.push(ids[q]!)
    positions.push(`[${(x1 + x2) / 2},${(y1 + y2) / 2}]`)
  })
  const edges = rowsOf(parts, (a, b) => `[${a},${b}],`).slice(0, -1)
  return `{"nodes":[${nodes.join()}],"edges":[${edges}],"positions":[${positions.join()}]}`
}
