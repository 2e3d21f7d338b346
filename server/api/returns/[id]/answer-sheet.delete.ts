import { revokeAnswer } from '../../../services/answer-sheets'

/** Takes every link to the answer back → `{revoked}`. */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  revokeAnswer(app, actor, partOf(event, 'id')),
)
