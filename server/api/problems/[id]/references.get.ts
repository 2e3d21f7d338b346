import { referencesQuerySchema } from '../../../../shared/schemas/reference'
import { referencesOf } from '../../../services/reference-view'

/** Looks for the optimum of one version of a problem, newest first, running ones with their job: `?version=`. */
export default defineRoute('member', (event, { app, ...actor }) => {
  const { version } = queryOf(event, referencesQuerySchema)
  return referencesOf(app, actor, partOf(event, 'id'), version)
})
