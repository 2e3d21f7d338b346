import { referenceQuerySchema } from '../../../../shared/schemas/reference'
import { referencesOf } from '../../../services/reference-view'

/** Looks for the optimum of one version of a problem, newest first, running ones with their job: `?version=`. */
export default defineRoute('member', (event, { app, ...actor }) => {
  const { version } = queryOf(event, referenceQuerySchema.pick({ version: true }))
  return referencesOf(app, actor, partOf(event, 'id'), version)
})
