import { shareAnswerSchema } from '../../../../shared/schemas/answers'
import { shareAnswer } from '../../../services/answer-sheets'

/** `{decode, assignments, remark}` → 201 `{id, url}`: a link that anyone may read by until it is revoked; shown once. */
export default defineRoute(
  ['developer', 'owner'],
  async (event, { app, ...actor }) => {
    const link = await shareAnswer(app, actor, partOf(event, 'id'), await bodyOf(event, shareAnswerSchema))
    setResponseStatus(event, 201)
    return link
  },
  { hasSecret: true },
)
