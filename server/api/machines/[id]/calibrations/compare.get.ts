import { compareCalibrationsSchema } from '../../../../../shared/schemas/machines'
import { compareCalibrations, comparisonFile } from '../../../../services/calibrations'

/**
 * What differs between two calibrations: `?from=&to=&format=json|csv`. Qubits and couplers lost and regained by published
 * number, every figure that moved, the largest changes of A and B in GHz and their s; 404 names a number there is not.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { format, ...numbers } = queryOf(event, compareCalibrationsSchema)
  const comparison = await compareCalibrations(app, actor, partOf(event, 'id'), numbers)
  if (format === 'json') return comparison
  const { fileName, text } = comparisonFile(comparison)
  return sendFile(event, fileName, 'text/csv', text)
})
