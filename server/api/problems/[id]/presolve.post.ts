import { presolveSchema } from '../../../../shared/schemas/presolve'
import { presolveView } from '../../../services/presolve'

/**
 * What pre-solve makes of a problem, without saving anything: `{version?}` → sizes before and after, what was taken out
 * and why (the first 2,000 variables), components left, a proved bound. Stopped when the caller goes away.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { version } = await bodyOf(event, presolveSchema)
  return presolveView(app, actor, partOf(event, 'id'), version, goneSignal(event))
})
