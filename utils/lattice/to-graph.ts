import Graph from 'graphology'
import type { Scene, SceneEdge, SceneNode } from './scene-types'

/** Attributes of the nodes sigma draws; the points between which bands run have size 0. y grows upwards, as sigma's. */
export type DrawnNode = Omit<SceneNode, 'chain'> & { readonly z: number; readonly chain: number }
export type DrawnEdge = Omit<SceneEdge, 'x1' | 'y1' | 'x2' | 'y2' | 'gaps'>

export type DrawnGraph = Graph<DrawnNode, DrawnEdge>

/** Sigma draws an edge half as thick, in pixels, as its size says. */
const THICKNESS_OF_PIXEL = 2

/** The scene as a graph: bands are edges between points of the qubits' segments. Equal points are one node. */
export function sceneGraph(scene: Scene): DrawnGraph {
  const graph: DrawnGraph = new Graph({ multi: true, type: 'directed', allowSelfLoops: true })
  // Without any node sigma neither draws nor follows its camera, and a machine without chains would stand still.
  graph.addNode('anchor', { ...BARE_POINT, x: 0, y: 0 })
  const pointAt = (x: number, y: number): string => {
    const key = `${x},${y}`
    if (!graph.hasNode(key)) graph.addNode(key, { ...BARE_POINT, x, y: -y })
    return key
  }
  for (const { x1, y1, x2, y2, gaps: _, ...look } of scene.edges)
    graph.addDirectedEdge(pointAt(x1, y1), pointAt(x2, y2), { ...look, size: THICKNESS_OF_PIXEL * look.size })
  scene.nodes.forEach((node, k) => graph.addNode(`mark ${k}`, { ...node, y: -node.y, z: 1 }))
  return graph
}

const BARE_POINT: Omit<DrawnNode, 'x' | 'y'> = {
  shape: 'circle',
  size: 0,
  color: '#000000',
  rim: '#000000',
  rimWidth: 0,
  halo: 0,
  z: 0,
  chain: -1,
}
