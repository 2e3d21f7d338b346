import { describe, expect, it } from 'vitest'
import { connectedParts } from '../../../../shared/engine/embedding/parts'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { gridGraph } from '../../../fixtures/graphs'

describe('connectedParts', () => {
  it('numbers the parts in order of their first vertex', () => {
    const { partOf, sizes } = connectedParts(graphFromEdges(5, [0, 3, 1, 4]))
    expect([...partOf]).toEqual([0, 1, 2, 0, 1])
    expect(sizes).toEqual([2, 2, 1])
  })

  it('leaves out vertices that are not kept, which may cut the graph', () => {
    const { partOf, sizes } = connectedParts(gridGraph(5, 1), Uint8Array.of(1, 1, 0, 1, 1))
    expect([...partOf]).toEqual([0, 0, -1, 1, 1])
    expect(sizes).toEqual([2, 2])
  })
})
