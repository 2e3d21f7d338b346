import { returnQuerySchema } from '../../../../shared/schemas/returns'
import { returnView } from '../../../services/return-view'

/** What a set of samples says: `?decode=majority|discard|descent`. */
export default defineRoute('member', (event, { app, ...actor }) =>
  returnView(app, actor, partOf(event, 'id'), queryOf(event, returnQuerySchema).decode),
)
