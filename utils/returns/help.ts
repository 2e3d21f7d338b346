import type { ChainBreaks, CouplerBreaks, DecodingRow, ReturnView } from '#shared/schemas/returns'
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

const byDecoding = (
  rows: readonly DecodingRow[],
  helpOf: (row: DecodingRow) => HelpRequest | null,
): readonly HelpCase[] =>
  rows.flatMap((row) => {
    const help = helpOf(row)
    return help ? [{ label: row.title, help }] : []
  })

/** What each column of the decodings is computed from, decoding by decoding. */
export function decodingCases({ decodings, breaks, reads, source }: ReturnView) {
  const broken = breaks?.readsWithBreak.count ?? 0
  const rehearsal = source === 'rehearsal'
  return {
    kept: () => byDecoding(decodings, ({ decoding }) => ({ id: 'readsKept', given: { reads, broken, decoding } })),
    times: () =>
      byDecoding(decodings, ({ best, bestCount: count, readsKept }) =>
        best === null ? null : { id: 'bestCount', given: { best, count, reads: readsKept, rehearsal } },
      ),
    median: () =>
      byDecoding(decodings, ({ median, readsKept }) =>
        median === null ? null : { id: 'medianEnergy', given: { median, reads: readsKept } },
      ),
    mean: () =>
      byDecoding(decodings, ({ total, readsKept }) =>
        total === null ? null : { id: 'meanEnergy', given: { total, reads: readsKept } },
      ),
    ties: () =>
      byDecoding(decodings, ({ decoding, ties }) => (decoding === 'discard' ? null : { id: 'ties', given: { ties } })),
  }
}

/** Energies of the assignments shown, first row first. */
export const solutionCases = ({ solutions, source }: ReturnView): HelpCase[] =>
  solutions.map(({ parts }, k) => ({
    label: `row ${k + 1}`,
    help: { id: 'energyOfState', given: { ...parts, rehearsal: source === 'rehearsal' } },
  }))

export const distanceCases = ({ solutions }: ReturnView): HelpCase[] =>
  solutions.map(({ distance }, k) => ({ label: `row ${k + 1}`, help: { id: 'distance', given: { distance } } }))
