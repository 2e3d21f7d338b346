import type { ConstraintGroup } from '../../shared/schemas/problems'
import type { ReturnView } from '../../shared/schemas/returns'
import type { ListedSolutions } from '../workers/tasks/list-solutions'
import { proportion } from './proportion'

/** How many of the decoded reads break each confirmed group; null where there are none. */
export function violationsView(
  groups: readonly ConstraintGroup[] | null,
  { violations }: Pick<ListedSolutions, 'violations'>,
): ReturnView['violations'] {
  if (!groups || groups.length === 0) return null
  return {
    any: proportion(violations.any, violations.reads),
    groups: groups.map(({ name, kind, k, members }, g) => ({
      name,
      kind,
      k,
      members: members.length,
      ...proportion(violations.perGroup[g]!, violations.reads),
    })),
  }
}
