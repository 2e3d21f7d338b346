import type { ChainBreaks, CouplerBreaks, DecodingRow, QubitBreaks, ReturnView } from '#shared/schemas/returns'
import type { HelpCase, HelpRequest } from '../help/registry'

/** How the numbers in the tables of returned samples are computed, row by row. */

const FORMAT = { significant: 3 }

/** Break rates of chains; a single qubit cannot break. */
export const chainRateCases = (chains: readonly ChainBreaks[], rehearsal: boolean): HelpCase[] =>
  chains
    .filter(({ length }) => length > 1)
    .map(({ label, count, total }) => ({
      label,
      help: {
        id: 'rate',
        given: { count, total, counted: 'reads in which the chain broke', of: 'reads', format: FORMAT, rehearsal },
      },
    }))

export const chainBoundCases = (chains: readonly ChainBreaks[]): HelpCase[] =>
  chains.flatMap(({ label, cutSplit, cutBoundExact: exact }) =>
    cutSplit ? [{ label, help: { id: 'cutBound', given: { ...cutSplit, exact } } }] : [],
  )

export const couplerRateCases = (couplers: readonly CouplerBreaks[], rehearsal: boolean): HelpCase[] =>
  couplers.map(({ a, b, label, count, total }) => ({
    label: `${label}, qubits ${a} and ${b}`,
    help: {
      id: 'rate',
      given: { count, total, counted: 'reads in which its two ends disagreed', of: 'reads', format: FORMAT, rehearsal },
    },
  }))

export const qubitRateCases = (qubits: readonly QubitBreaks[], rehearsal: boolean): HelpCase[] =>
  qubits.map(({ qubit, label, count, total }) => ({
    label: `${label}, qubit ${qubit}`,
    help: {
      id: 'rate',
      given: {
        count,
        total,
        counted: 'reads in which it disagreed with the majority of its chain',
        of: 'reads',
        format: FORMAT,
        rehearsal,
      },
    },
  }))

const byDecoding = (
  rows: readonly DecodingRow[],
  helpOf: (row: DecodingRow) => HelpRequest | null,
): readonly HelpCase[] =>
  rows.flatMap((row) => {
    const help = helpOf(row)
    return help ? [{ label: row.title, help }] : []
  })

/** The computed columns of the decodings, explained decoding by decoding. */
export function decodingColumns({ decodings, breaks, reads, source, problem: { sense } }: ReturnView) {
  const broken = breaks?.readsWithBreak.count ?? 0
  const rehearsal = source === 'rehearsal'
  return [
    {
      label: 'Reads kept',
      name: 'the number of reads kept',
      cases: () => byDecoding(decodings, ({ decoding }) => ({ id: 'readsKept', given: { reads, broken, decoding } })),
    },
    {
      label: 'Best',
      name: 'the best energy',
      cases: () =>
        byDecoding(decodings, ({ best, readsKept }) =>
          best === null ? null : { id: 'bestOfDecoding', given: { best, reads: readsKept, sense, rehearsal } },
        ),
    },
    {
      label: 'Reads at best',
      name: 'the number of reads at the best energy',
      cases: () =>
        byDecoding(decodings, ({ best, bestCount: count, readsKept }) =>
          best === null ? null : { id: 'bestCount', given: { best, count, reads: readsKept, rehearsal } },
        ),
    },
    {
      label: 'Median',
      name: 'the median energy',
      cases: () =>
        byDecoding(decodings, ({ median, readsKept }) =>
          median === null ? null : { id: 'medianEnergy', given: { median, reads: readsKept } },
        ),
    },
    {
      label: 'Mean',
      name: 'the mean energy',
      cases: () =>
        byDecoding(decodings, ({ total, readsKept }) =>
          total === null ? null : { id: 'meanEnergy', given: { total, reads: readsKept } },
        ),
    },
    {
      label: 'Ties',
      name: 'the number of ties',
      cases: () =>
        byDecoding(decodings, ({ decoding, ties }) =>
          decoding === 'discard' ? null : { id: 'ties', given: { ties } },
        ),
    },
  ] as const
}

/** The computed columns of the assignments shown, explained row by row. */
export function solutionColumns({ solutions, source }: ReturnView) {
  const byRow = (helpOf: (row: ReturnView['solutions'][number]) => HelpRequest): readonly HelpCase[] =>
    solutions.map((row, k) => ({ label: `row ${k + 1}`, help: helpOf(row) }))
  const rehearsal = source === 'rehearsal'
  return [
    {
      label: 'Energy',
      name: 'the energy of an assignment',
      cases: () => byRow(({ parts }) => ({ id: 'energyOfState', given: { ...parts, rehearsal } })),
    },
    {
      label: 'Differs in',
      name: 'what an assignment differs in',
      cases: () => byRow(({ distance }) => ({ id: 'distance', given: { distance } })),
    },
  ] as const
}
