import { setResponseHeaders } from 'h3'
import { sharedAnswerQuerySchema } from '../../../shared/schemas/answers'
import { answerCsv, sharedAnswer } from '../../services/answer-sheets'

/** The answer behind a link, for whoever holds it: `?format=json|csv`. 404 once it was revoked. */
export default definePublicRoute(async (event, app) => {
  // The address is the key: it goes to no cache, no search engine, and to no other site with a link.
  setResponseHeaders(event, {
    'cache-control': 'no-store',
    'x-robots-tag': 'noindex',
    'referrer-policy': 'no-referrer',
  })
  const shared = await sharedAnswer(app, partOf(event, 'token'))
  if (queryOf(event, sharedAnswerQuerySchema).format === 'json') return shared
  return sendFile(event, 'answer.csv', 'text/csv', answerCsv(shared.answer))
})
