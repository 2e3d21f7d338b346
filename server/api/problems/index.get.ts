import { libraryQuerySchema } from '../../../shared/schemas/library'
import { libraryPage } from '../../services/library'

/**
 * Problems, newest change first: `{items, nextCursor, previousCursor, total, start}`. `?q&tag&form&state` narrow them,
 * `?sort&direction` order them, `?limit&cursor` turn the pages.
 */
export default defineRoute('member', (event, { app, ...actor }) =>
  libraryPage(app, actor, queryOf(event, libraryQuerySchema)),
)
