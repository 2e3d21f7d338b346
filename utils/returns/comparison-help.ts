import type { ComparedReturn } from '#shared/schemas/return-comparison'
import type { HelpCase, HelpRequest } from '../help/registry'
import { samplesNumber } from './comparison'
import { CHAIN_READS } from './facts'

const FORMAT = { significant: 3 }

const casesOf = (items: readonly ComparedReturn[], helpOf: (item: ComparedReturn) => HelpRequest | null): HelpCase[] =>
  items.flatMap((item) => {
    const help = helpOf(item)
    return help ? [{ label: samplesNumber(item), help }] : []
  })

const isRehearsal = ({ source }: ComparedReturn): boolean => source === 'rehearsal'

/** The computed columns of samples side by side, explained row by row. */
export const comparedColumns = (items: readonly ComparedReturn[]) =>
  ({
    breaks: () =>
      casesOf(items, (item) => ({
        id: 'rate',
        given: { ...item.chainReads, ...CHAIN_READS, format: FORMAT, rehearsal: isRehearsal(item) },
      })),
    success: () =>
      casesOf(items, (item) =>
        item.success
          ? {
              id: 'rate',
              given: {
                count: item.success.count,
                total: item.success.total,
                counted: 'reads within the gap',
                of: 'reads',
                format: FORMAT,
                rehearsal: isRehearsal(item),
              },
            }
          : null,
      ),
    time: () =>
      casesOf(items, (item) =>
        item.r99 && item.r99.value !== null
          ? {
              id: 'timeToSolution',
              given: {
                reads: item.r99.value,
                milliseconds: item.millisecondsPerRead,
                isMeasured: item.isTimeMeasured,
                rehearsal: isRehearsal(item),
              },
            }
          : null,
      ),
    temperature: () =>
      casesOf(items, (item) =>
        item.temperature
          ? {
              id: 'effectiveTemperature',
              given: {
                temperature: item.temperature.temperature,
                rows: item.temperature.rows,
                rowsInAll: item.temperature.rowsInAll,
                rehearsal: isRehearsal(item),
              },
            }
          : null,
      ),
  }) as const
