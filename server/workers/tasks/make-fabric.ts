import type { Control } from '../../../shared/engine/control'
import { buildFabric } from '../../../shared/engine/machine/build-fabric'
import type { Fabric, PublishedFamily } from '../../../shared/engine/machine/fabric'

/** The graph of a family of this size as made. */
export const makeFabric = ({ family }: { family: PublishedFamily }, _control: Control<never>): Fabric =>
  buildFabric(family)
