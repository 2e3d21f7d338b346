import { describe, expect, it } from 'vitest'
import { GraphCollector } from '../../../../../shared/engine/machine/graph-files/collector'
import type { GraphFormat, GraphReading } from '../../../../../shared/engine/machine/graph-files/graph-file'
import { readGraphFile } from '../../../../../shared/engine/machine/graph-files/read-graph-file'

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)
const read = (text: string, format?: GraphFormat): GraphReading => readGraphFile(bytesOf(text), { format })

/** Numbers, couplers by number, positions. */
function told({ graph, issues }: GraphReading) {
  expect(issues).toEqual([])
  const { ids, ends, positions } = graph!
  const couplers = Array.from({ length: ends.length / 2 }, (_, k) => `${ids[ends[2 * k]!]}-${ids[ends[2 * k + 1]!]}`)
  return { ids: [...ids], couplers, positions: positions && [...positions] }
}

/** Lines and messages of what is wrong. */
function wrong(text: string, format?: GraphFormat): string[] {
  const { graph, issues, issueCount } = read(text, format)
  expect(graph).toBeNull()
  expect(issueCount).toBeGreaterThanOrEqual(issues.length)
  return issues.map(({ line, message }) => (line === undefined ? message : `${line}: ${message}`))
}

const graphml = (inside: string, keys = ''): string =>
  `<?xml version="1.0" encoding="UTF-8"?>\n<graphml xmlns="http://graphml.graphdrawing.org/xmlns">\n${keys}<graph edgedefault="undirected">\n${inside}\n</graph>\n</graphml>`
const XY = '<key id="d0" for="node" attr.name="x" attr.type="double"/><key id="d1" for="node" attr.name="y"/>\n'
const mtx = (kind: string, ...lines: string[]): string =>
  [`%%MatrixMarket matrix coordinate ${kind}`, ...lines].join('\n')

const TRIANGLE = { ids: [0, 5, 7], couplers: ['0-5', '0-7', '5-7'], positions: null }

describe('edge lists', () => {
  it.each([
    '5 0\n0 7\n7 5',
    '5,0\r\n0,7\r\n7,5\r\n',
    '# three qubits\nfirst;second\n5;0\n0;7 # the long one\n\n7;5',
    '\uFEFFa\tb\n5\t0\n0\t7\n7\t5\n',
    '% comment\n 5   0\n 0 , 7 \n007 5\n5',
  ])('%j is a triangle', (text) => {
    expect(told(read(text))).toEqual(TRIANGLE)
  })

  it('keeps qubits without couplers', () => {
    expect(told(read('3\n1 2\n'))).toEqual({ ids: [1, 2, 3], couplers: ['1-2'], positions: null })
  })

  it('names the line of everything that is wrong', () => {
    expect(wrong('1 2\n3 3\n4 x\n5 6 0.5\n7 20000000\n8 -1\n9,,4\n')).toEqual([
      '2: qubit 3 is coupled to itself',
      '3: "x" is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      '4: 3 fields where a coupler has two qubit numbers',
      '5: qubit 20000000: numbers end at 10\u202f000\u202f000',
      '6: "-1" is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      '7: "9,,4" has an empty field',
    ])
  })

  it('counts all couplers that are listed again and names where', () => {
    const text = ['0 1', '1 0', ...Array.from({ length: 200 }, () => '0 1')].join('\n')
    const { issues, issueCount } = read(text)
    expect(issueCount).toBe(201)
    expect(issues).toHaveLength(100)
    expect(issues[0]).toEqual({ line: 2, message: 'coupler 1-0 is listed again, after line 1' })
  })

  it('takes names of columns only from the first line', () => {
    expect(wrong('1 2\nleft right')).toHaveLength(1)
    expect(wrong('left right\nleft right')[0]).toMatch(/^2: "left" is no qubit number/)
  })

  it('says so when there is nothing, or no text', () => {
    expect(wrong('# only a comment\n')).toEqual(['the file holds no qubits'])
    expect(wrong('\0\0')).toEqual(['the file is not text in UTF-8'])
    expect(wrong(`1 2\n${'9'.repeat(3000)}`)[0]).toMatch(/^2: the line is longer/)
    const broken = readGraphFile(Uint8Array.of(0x31, 0x20, 0x32, 0x0a, ...new Array<number>(5000).fill(0x20), 0xff))
    expect(broken.graph).toBeNull()
  })

  it('refuses more qubits than there can be', () => {
    expect(wrong(Array.from({ length: 131_073 }, (_, k) => `${k}`).join('\n'))[0]).toMatch(
      /more than the 131\u202f072 qubits/,
    )
    expect(wrong(Array.from({ length: 66_000 }, (_, k) => `${2 * k} ${2 * k + 1}`).join('\n'))[0]).toBe(
      'there are 132\u202f000 qubits; at most 131\u202f072 are possible',
    )
  })

  it('refuses more couplers than there can be', () => {
    const collector = new GraphCollector(false, (_, line) => ({ line }))
    for (let k = 0; k < 1_000_000; k++) collector.addCoupler(k % 1001, 1001 + Math.floor(k / 1001), k)
    expect(() => collector.addCoupler(1, 2, 1_000_000)).toThrow(/more than the 1\u202f000\u202f000 couplers/)
  })
})

describe('Matrix Market', () => {
  it('is numbered from 0, whatever its values', () => {
    const expected = { ids: [0, 1, 2], couplers: ['0-1', '0-2'], positions: null }
    expect(told(read(mtx('pattern symmetric', '% c', '3 3 2', '2 1', '3 1')))).toEqual(expected)
    expect(told(read(mtx('real general', '3 3 2', '1 2 -0.5', '3 1 1e3')))).toEqual(expected)
    // A general matrix may hold both triangles.
    expect(told(read(mtx('integer general', '3 3 4', '1 2 1', '2 1 1', '1 3 1', '3 1 1')))).toEqual(expected)
  })

  it('keeps rows without entries', () => {
    expect(told(read(mtx('pattern symmetric', '3 3 1', '3 2')))).toMatchObject({ ids: [0, 1, 2], couplers: ['1-2'] })
  })

  it('names what is wrong', () => {
    expect(wrong(mtx('pattern symmetric', '3 3 5', '2 1', '1 2', '3 3', '4 1', '2 x'))).toEqual([
      '4: coupler 0-1 is listed again, after line 3',
      '5: qubit 2 is coupled to itself',
      '6: row and column must be whole numbers from 1 to 3',
      '7: row and column must be whole numbers from 1 to 3',
    ])
    expect(wrong(mtx('pattern symmetric', '3 3 2', '2 1', '1 2'))).toEqual([
      '4: coupler 0-1 is listed again, after line 3',
    ])
    expect(wrong(mtx('pattern general', '3 3 2', '2 1', '2 1'))).toEqual([
      '4: coupler 1-0 is listed again, after line 3',
    ])
    expect(wrong(mtx('pattern general', '3 3 2', '2 1'))).toEqual(['2: the size line promises 2 entries; there are 1'])
    expect(wrong(mtx('real general', '2 2 1', '2 1 0'))).toEqual([
      '3: the value is 0, which is no coupler: leave it out',
    ])
    expect(wrong(mtx('real general', '2 2 1', '2 1'))).toEqual(['3: an entry has 3 numbers, not 2'])
    expect(wrong(mtx('complex general', '2 2 1', '2 1 0 0'))[0]).toMatch(/^1: the values must be pattern/)
    expect(wrong(mtx('pattern skew-symmetric', '2 2 1', '2 1'))[0]).toMatch(/^1: the symmetry/)
    expect(wrong('%%MatrixMarket matrix array real general\n1 1\n0')[0]).toMatch(/^1: the first line must be/)
    expect(wrong(mtx('pattern general', '2 3 0'))[0]).toMatch(/^2: the matrix is not square/)
    expect(wrong(mtx('pattern general', '% nothing'))).toEqual(['the file ends before its size line'])
    expect(wrong(mtx('pattern general', '999999 999999 0'))[0]).toMatch(/131/)
  })
})

describe('GraphML', () => {
  const nodes = '<node id="0"/>\n<node id="5"/>\n<node id="7"/>'
  const edges = '<edge source="5" target="0"/><edge source="0" target="7"/><edge id="e" source="7" target="5"></edge>'

  it('is a triangle, with prefixes, comments and data passed over', () => {
    expect(told(read(graphml(nodes + edges)))).toEqual(TRIANGLE)
    const prefixed = graphml(nodes + edges).replaceAll(/<(\/?)(\w)/g, '<$1g:$2')
    expect(told(read(prefixed))).toEqual(TRIANGLE)
    const busy = graphml(
      `<!-- <node id="9"/> -->${nodes}<desc><![CDATA[<node/>]]></desc>${edges}<data key="w">1 &lt; 2</data>`,
    )
    expect(told(read(busy))).toEqual(TRIANGLE)
  })

  it('takes positions from the keys named x and y', () => {
    const placed = (id: number, x: string, y: string): string =>
      `<node id="${id}"><data key="d1">${y}</data><data key="d0"> ${x} </data></node>`
    expect(told(read(graphml(placed(1, '0.5', '-2') + placed(0, '&#49;e1', '3'), XY)))).toEqual({
      ids: [0, 1],
      couplers: [],
      positions: [10, 3, 0.5, -2],
    })
    expect(wrong(graphml(placed(1, '1', '2') + placed(2, 'x', '2'), XY))).toEqual([
      '5: the position "x" is not a finite number',
      '5: the position of qubit 2 has only one of x and y',
    ])
    expect(wrong(graphml(`${placed(1, '1', '2')}\n${placed(2, '1', '2')}`, XY))).toEqual([
      '6: qubit 2 lies where qubit 1 does, at (1, 2)',
    ])
    expect(wrong(graphml(`${placed(1, '1', '2')}\n<node id="8"/>`, XY))).toEqual([
      '6: 1 of 2 qubits have no position, qubit 8 first: give all or none',
    ])
  })

  it('lets a directed graph state each coupler once in each direction', () => {
    const both = graphml('<node id="1"/><node id="2"/><edge source="1" target="2"/><edge source="2" target="1"/>')
    expect(wrong(both)).toEqual(['4: coupler 2-1 is listed again, after line 4'])
    expect(told(read(both.replace('undirected', 'directed'))).couplers).toEqual(['1-2'])
  })

  it('names what is wrong', () => {
    expect(wrong(graphml('<node id="n0"/>\n<node id="1"/>\n<node id="1"/>'))).toEqual([
      '4: "n0" is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      '6: qubit 1 is listed again',
    ])
    expect(wrong(graphml('<node id="1"/>\n<edge source="1" target="2"/>\n<edge source="1" target="1"/>'))).toEqual([
      '5: qubit 2 is not among the qubits that the file lists',
      '6: qubit 1 is coupled to itself',
    ])
    expect(wrong(graphml('<node id="1"/><hyperedge/>'))).toEqual(['4: a hyperedge joins more than two qubits'])
    expect(wrong(graphml('<node id="1"><graph><node id="2"/></graph></node>'))).toEqual([
      '4: the file holds more than one graph',
    ])
    expect(wrong('<svg/>')).toEqual(['1: the outermost element must be graphml, not "svg"'])
  })

  it.each([
    [
      '<!DOCTYPE graphml [<!ENTITY a "b">]><graphml/>',
      '1: document types and entities are not read: take the DOCTYPE out',
    ],
    [
      '<graphml>\n&bomb;</graphml>',
      '1: the reference &bomb; means nothing here: only XML’s own five entities are read',
    ],
    ['<graphml><graph></graphml>', '1: graphml ends where graph is open'],
    ['<graphml>', '1: graphml is not closed: the file is cut short'],
    ['<graphml/>\n<graphml/>', '2: there is more than one outermost element'],
    ['<graphml a="1" a="2"/>', '1: the attribute a stands twice'],
    ['<graphml a=1/>', '1: the element graphml is not written right'],
    ['<graphml><!-- </graphml>', '1: a comment is not closed'],
    ['<graphml/>text', '1: text stands outside the first element'],
    ['<graphml>< /graphml>', '1: "<" begins no element; write it as &lt;'],
    ['<graphml>'.repeat(70), '1: elements are nested more than 64 deep'],
  ])('refuses %j', (text, message) => {
    expect(wrong(text)).toEqual([message])
  })
})

describe('JSON', () => {
  const json = (document: unknown): string => JSON.stringify(document)

  it('is a triangle as node-link, with numbers in any writing, and as this product writes graphs', () => {
    const links = [
      { source: 5, target: 0 },
      { source: '0', target: 7 },
      { source: 7, target: 5, weight: 2 },
    ]
    const nodes = [{ id: 0 }, { id: '5', colour: 'red' }, { id: 7 }]
    expect(told(read(json({ nodes, links })))).toEqual(TRIANGLE)
    expect(told(read(json({ directed: false, multigraph: false, graph: {}, nodes, edges: links })))).toEqual(TRIANGLE)
    const own = {
      nodes: [0, 5, 7],
      edges: [
        [0, 5],
        [0, 7],
        [5, 7],
      ],
      positions: [
        [0, 0],
        [1, 0],
        [0, 2.5],
      ],
    }
    expect(told(read(json(own)))).toEqual({ ...TRIANGLE, positions: [0, 0, 1, 0, 0, 2.5] })
  })

  it('takes positions from x and y of all nodes', () => {
    const nodes = [
      { id: 3, x: 1, y: 2 },
      { id: 1, x: -1, y: 0.5 },
    ]
    expect(told(read(json({ nodes, links: [] })))).toEqual({ ids: [1, 3], couplers: [], positions: [-1, 0.5, 1, 2] })
    expect(wrong(json({ nodes: [...nodes, { id: 4 }], links: [] }))).toEqual([
      'nodes[2]: 1 of 3 qubits have no position, qubit 4 first: give all or none',
    ])
    expect(
      wrong(
        json({
          nodes: [
            { id: 3, x: 1 },
            { id: 4, x: '1', y: 2 },
          ],
          links: [],
        }),
      ),
    ).toEqual([
      'nodes[0]: the position of qubit 3 must be two finite numbers',
      'nodes[1]: the position of qubit 4 must be two finite numbers',
    ])
    expect(wrong('{"nodes":[{"id":1,"x":1e999,"y":0}],"links":[]}')).toHaveLength(1)
  })

  it('names the place of what is wrong', () => {
    const nodes = [{ id: 'a' }, { id: 1.5 }, { id: 2 }, { id: 2 }, 17, null]
    const links = [{ source: 2, target: 99 }, { source: 2, target: 2 }, [1, 2, 3], 'x']
    expect(wrong(json({ nodes, links }))).toEqual([
      'nodes[0]: "a" is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      'nodes[1]: 1.5 is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      'nodes[5]: null is no qubit number: qubits have whole numbers from 0, so number them and write the numbers',
      'links[1]: qubit 2 is coupled to itself',
      'links[2]: [1,2,3] is no pair of qubits',
      'links[3]: "x" is no pair of qubits',
      'nodes[3]: qubit 2 is listed again',
    ])
    expect(wrong(json({ nodes: [1, 2], links: [[1, 3]] }))).toEqual([
      'links[0]: qubit 3 is not among the qubits that the file lists',
    ])
    expect(wrong('{"nodes": [1, 2, 3, 4, 5, 6, 7, 8, 9],\n "links": [[1, 2], [3, 4], [5, 6}')).toEqual([
      '2: the file is no valid JSON',
    ])
    expect(wrong('{"nodes": [1],')[0]).toMatch(/the file is no valid JSON$/)
    expect(wrong('[1]')).toEqual(['the file must hold one object with nodes and links'])
    expect(wrong(json({ nodes: [1] }))).toEqual(['couplers must be listed under links or edges, and not under both'])
    expect(wrong(json({ nodes: 1, links: [] }))).toEqual(['nodes must be a list, not 1'])
    expect(wrong(json({ nodes: [1, 2], edges: [], positions: [[0, 0]] }))).toEqual([
      'there are 2 nodes and 1 positions',
    ])
  })
})

describe('the format', () => {
  it('is as given, or what the content looks like', () => {
    expect(read('1 2')).toMatchObject({ format: 'edge-list', formatSource: 'detected' })
    expect(read('  {"nodes":[],"links":[]}')).toMatchObject({ format: 'json' })
    expect(read('\n<graphml/>')).toMatchObject({ format: 'graphml' })
    expect(read('%%matrixmarket matrix coordinate pattern general\n')).toMatchObject({ format: 'matrix-market' })
    expect(read('1 2', 'json')).toMatchObject({ format: 'json', formatSource: 'given', graph: null })
  })
})
