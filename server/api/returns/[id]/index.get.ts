import { returnQuerySchema } from '../../../../shared/schemas/returns'
import { returnView } from '../../../services/return-view'

/** What a set of samples says: `?decode=majority|discard|descent&feasible=true|false`. */
export default defineRoute('member', (event, { app, ...actor }) => {
  const { decode, feasible } = queryOf(event, returnQuerySchema)
  return returnView(app, actor, partOf(event, 'id'), decode, feasible === 'true')
})
