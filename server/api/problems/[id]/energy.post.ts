import { energyRequestSchema, versionQuerySchema } from '../../../../shared/schemas/problems'
import { energiesOf } from '../../../services/problems'

/**
 * Energies of at most 10,000 states, offset included, in the problem's own sense: `{form, states}` → `{energies}`;
 * `?version=` for another version than the current one.
 */
export default defineRoute('member', async (event, { app, ...actor }) => ({
  energies: await energiesOf(
    app,
    actor,
    partOf(event, 'id'),
    await bodyOf(event, energyRequestSchema),
    queryOf(event, versionQuerySchema).version,
  ),
}))
