import { answerQuerySchema } from '../../../../shared/schemas/answers'
import { answerCsv, answerPage } from '../../../services/answer-sheets'

/** The answer for the person who asked, and the links to it that stand: `?decode=&assignments=1…20&format=json|csv`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { format, ...asked } = queryOf(event, answerQuerySchema)
  const page = await answerPage(app, actor, partOf(event, 'id'), asked)
  return format === 'csv' ? sendFile(event, 'answer.csv', 'text/csv', answerCsv(page.answer)) : page
})
