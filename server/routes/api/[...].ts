import { DomainError } from '../../../shared/errors'
import { toHttpError } from '../../utils/http'

const MAX_SHOWN = 200

/** What no route answers: without this it would go to the pages, and a script would be sent to the page of sign-in. */
export default defineEventHandler((event) => {
  const path = event.path.split('?')[0]!.slice(0, MAX_SHOWN)
  throw toHttpError(
    new DomainError('not found', 'route.none', `There is no ${event.method} ${path}. All routes are at /reference.`),
  )
})
