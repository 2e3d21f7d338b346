import { coefficientsQuerySchema } from '../../../../shared/schemas/problems'
import { problemFileOf } from '../../../services/problem-files'

/**
 * The problem as a file in either form: `?form=qubo|ising&format=csv|dense|mtx|npy|npz|json|cut&gzip=1`. Offset, sense and
 * labels travel in it; 422 with the reason where the format cannot hold the problem.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { fileName, mediaType, bytes } = await problemFileOf(
    app,
    actor,
    partOf(event, 'id'),
    queryOf(event, coefficientsQuerySchema),
  )
  return sendFile(event, fileName, mediaType, bytes)
})
