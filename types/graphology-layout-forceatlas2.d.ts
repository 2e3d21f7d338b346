/** One step of ForceAtlas2 on matrices in place; the package exports it without a declaration. */
declare module 'graphology-layout-forceatlas2/iterate' {
  import type { ForceAtlas2Settings } from 'graphology-layout-forceatlas2'

  export default function iterate(
    settings: Required<ForceAtlas2Settings>,
    nodes: Float64Array,
    edges: Float64Array,
  ): void
}
