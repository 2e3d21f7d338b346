import { versionQuerySchema } from '../../../../shared/schemas/problems'
import { structureDetailsOf } from '../../../services/problem-structure'

/**
 * The slower part of the structure report, worked out when first asked for: treewidth from below, sizes of components,
 * signs, symmetries, and coefficients beside the control error of each machine; `?version=` for an earlier one.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  structureDetailsOf(app, actor, partOf(event, 'id'), queryOf(event, versionQuerySchema).version),
)
