/**
 * Edge lists: a coupler a line as two qubit numbers, apart by blanks, tabs, commas or semicolons. A line with one number
 * is a qubit, for those without couplers. `#` and `%` open comments; a first line of names is passed over.
 */
import { chunksOf, watched } from '../../formats/chunks'
import { eachLine } from '../../formats/blocks'
import { LineDecoder } from '../../formats/text'
import { GraphCollector } from './collector'
import type { GraphControl } from './graph-file'
import { qubitNumber, shown } from './graph-file'

const MAX_LINE_BYTES = 2000

/** Names of columns: neither begins like a number. */
const isHeader = (fields: readonly string[]): boolean =>
  fields.length <= 2 && fields.every((field) => /^"?\p{L}/u.test(field))

function readFields(fields: readonly string[], line: number, into: GraphCollector): void {
  if (fields.length > 2)
    return into.reject('coupler', line, `${fields.length} fields where a coupler has two qubit numbers`)
  const [a, b] = fields.map(qubitNumber)
  for (const fault of [a, b]) if (typeof fault === 'string') return into.reject('coupler', line, fault)
  if (b === undefined) into.addQubit(a as number, line)
  else into.addCoupler(a as number, b as number, line)
}

export function readEdgeList(bytes: Uint8Array, control?: GraphControl): GraphCollector {
  const collector = new GraphCollector(false, (_, line) => ({ line }))
  const decoder = new LineDecoder()
  let isFirst = true
  eachLine(watched(chunksOf(bytes), control), (chunk, start, end, line) => {
    if (end - start > MAX_LINE_BYTES)
      return collector.reject('coupler', line, `the line is longer than ${MAX_LINE_BYTES} bytes`)
    const text = decoder.decode(chunk, start, end, line)
    const usual = /^(\d{1,7})[ \t,;](\d{1,7})$/.exec(text)
    if (usual) {
      isFirst = false
      return collector.addCoupler(Number(usual[1]), Number(usual[2]), line)
    }
    const data = text.replace(/[#%].*$/, '').trim()
    if (data === '') return
    const fields = data.split(/\s*[,;]\s*|\s+/)
    if (isFirst && isHeader(fields)) isFirst = false
    else if (fields.includes('')) collector.reject('coupler', line, `${shown(data)} has an empty field`)
    else readFields(fields, line, collector)
    isFirst = false
  })
  return collector
}
