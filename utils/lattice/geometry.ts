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

export function chainGeometry(data: LatticeData, chains: ChainLayer): ChainGeometry {
  const roles = rolesOf(data, chains)
  const spans = spansOf(data, roles)
  const joints = jointsOf(data, roles)
  const bands = bandsOf(data, spans, joints)
  return { roles, spans, joints, bands, crossings: crossingsOf(bands), neighbours: neighboursOf(chains) }
}
