import { coefficientsQuerySchema } from '../../../../shared/schemas/problems'
import { coefficientsOf } from '../../../services/problems'

/** The problem as a file in either form: `?form=qubo|ising&format=csv|dense`; offset, sense and labels travel in it. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { fileName, bytes } = await coefficientsOf(
    app,
    actor,
    partOf(event, 'id'),
    queryOf(event, coefficientsQuerySchema),
  )
  return sendFile(event, fileName, 'text/csv', bytes)
})
