import { bandsOf, jointsOf } from './bands'
import type { Band, Joint } from './bands'
import { crossingsOf } from './crossings'
import type { Crossing } from './crossings'
import { neighboursOf, rolesOf } from './roles'
import type { Roles } from './roles'
import { spansOf } from './spans'
import type { Span } from './spans'
import type { ChainLayer, LatticeData } from './types'

/** Everything about an embedding's drawing that does not depend on lens, focus, theme or zoom. */
export interface ChainGeometry {
  readonly roles: Roles
  readonly spans: readonly Span[]
  readonly bands: readonly Band[]
  readonly joints: readonly Joint[]
  readonly crossings: readonly Crossing[]
  /** Variables that interact with each variable. */
  readonly neighbours: readonly (readonly number[])[]
}

const known = new WeakMap<ChainLayer, { readonly data: LatticeData; readonly geometry: ChainGeometry }>()

/** Worked out once for as long as machine and chains are the same objects: hues, drawing and tags all ask for it. */
export function chainGeometry(data: LatticeData, chains: ChainLayer): ChainGeometry {
  const kept = known.get(chains)
  if (kept?.data === data) return kept.geometry
  const roles = rolesOf(data, chains)
  const spans = spansOf(data, roles)
  const joints = jointsOf(data, roles)
  const bands = bandsOf(data, spans, joints)
  const geometry = { roles, spans, joints, bands, crossings: crossingsOf(bands), neighbours: neighboursOf(chains) }
  known.set(chains, { data, geometry })
  return geometry
}
