import { referencesQuerySchema } from '../../../../shared/schemas/reference'
import { referencesOf } from '../../../services/reference-view'

/** Looks for the optimum of one version of a problem, newest first, running ones with their job: `?version&limit&cursor`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  referencesOf(app, actor, partOf(event, 'id'), queryOf(event, referencesQuerySchema)),
)
