import { graphFromSortedEdges } from '../../shared/engine/graph/build'
import type { CustomGraph, Fabric } from '../../shared/engine/machine/fabric'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

type Parts = Pick<Fabric, 'ids' | 'segments'> & { readonly ends: Uint32Array }

/** Numbers, couplers and places of an uploaded graph as they are stored. */
export const packFabric = ({ ids, ends, segments }: Parts): Uint8Array<ArrayBuffer> =>
  packArrays({ ids, ends, segments })

/** The graph of a machine of no family, as it was packed. */
export function unpackFabric(family: CustomGraph, bytes: Uint8Array): Fabric {
  const { ids, ends, segments } = unpackArrays(bytes).arrays as unknown as Parts
  return { family, graph: graphFromSortedEdges(ids.length, ends), ids, segments }
}
