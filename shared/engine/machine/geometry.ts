import type { Fabric, PublishedFamily } from './fabric'

/** What searches and bounds may take from a machine beside its graph. */
export interface MachineGeometry {
  readonly segments: Float32Array | null
  readonly family: PublishedFamily | null
}

/**
 * What is known of a machine's geometry: where its qubits lie, null where the drawing was only worked out from the
 * graph, and its family, null for a graph of none.
 */
export const geometryOf = ({ family, segments }: Pick<Fabric, 'family' | 'segments'>): MachineGeometry =>
  family.kind === 'custom'
    ? { segments: family.positions === 'given' ? segments : null, family: null }
    : { segments, family }
