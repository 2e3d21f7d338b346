import { breaksQuerySchema } from '../../../../shared/schemas/machine-use'
import { breaksCsv, machineBreaks } from '../../../services/machine-breaks'

/** Breaks by qubit and coupler over all returns of a calibration: `?calibration=&rehearsals=true&format=json|csv`. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { format, ...query } = queryOf(event, breaksQuerySchema)
  const breaks = await machineBreaks(app, actor, partOf(event, 'id'), query)
  if (format === 'json') return breaks
  return sendFile(event, `breaks-calibration-${breaks.calibration}.csv`, 'text/csv', breaksCsv(breaks))
})
