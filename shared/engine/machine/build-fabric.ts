import type { Fabric, PublishedFamily } from './fabric'
import { rulesOf } from './families/registry'
import { familyProblems } from './family'

/**
 * Builds the family graph as manufactured, with published qubit numbers and the drawing's geometry.
 * @throws RangeError when `familyProblems` has anything to say about the family
 */
export function buildFabric(family: PublishedFamily): Fabric {
  const [problem] = familyProblems(family)
  if (problem !== undefined) throw new RangeError(problem)
  return { family, ...rulesOf(family).build(family) }
}
