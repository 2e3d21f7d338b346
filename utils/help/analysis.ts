import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { BESAG, DEFINITION, KRUSKAL_WALLIS, PEARSON, RONNOW } from './sources'
import { formatNumber, formatSignificant } from '../format'
import { formatDuration } from '../formatTime'

/** How the figures of the analysis of returned samples are computed. */

interface Reads {
  p: number
  reads: number
  rehearsal: boolean
}

const cautionOf = ({ rehearsal }: { rehearsal: boolean }) => (rehearsal ? CAUTIONS.rehearsal : CAUTIONS.samples)

const chance = (p: number): string => (p < 1e-4 ? 'under 0.0001' : formatSignificant(p, 2))

export const analysisHelp = {
  r99: entry<Reads>({
    inputs: ({ p }) => [{ symbol: 'p', name: 'share of reads that reach the reference within the gap', value: p }],
    method: () =>
      'Reads for at least one success with 99 % confidence, R99 = ln(1 − 0.99) / ln(1 − p), and at least one. The ends of its interval are those of p put through the same formula.',
    result: ({ reads }) => formatNumber(reads, { significant: 3 }),
    unit: () => 'reads',
    sources: () => [RONNOW],
    caution: cautionOf,
  }),
  timeToSolution: entry<{ reads: number; milliseconds: number; isMeasured: boolean; rehearsal: boolean }>({
    inputs: ({ reads, milliseconds, isMeasured }) => [
      { symbol: 'R', name: 'R99', value: reads, unit: 'reads' },
      {
        symbol: 't',
        name: 'machine time a read',
        value: milliseconds,
        unit: 'ms',
        from: isMeasured ? 'given with the samples' : 'estimate of the run sheet, programming included',
      },
    ],
    steps: () => [
      {
        symbol: 'TTS',
        name: 'time to solution',
        expr: { op: 'times', of: ['R', 't'] },
        show: (value) => formatDuration(value / 1000),
      },
    ],
    sources: () => [RONNOW],
    caution: cautionOf,
  }),
  effectiveTemperature: entry<{ temperature: number; rows: number; rowsInAll: number; rehearsal: boolean }>({
    inputs: ({ rows, rowsInAll }) => [
      { symbol: 'r', name: 'rows looked at', value: rows },
      { symbol: 'n', name: 'rows in all', value: rowsInAll },
    ],
    method: () =>
      'The temperature of the Boltzmann distribution of the programmed values under which each spin is likeliest, given all the others: maximum pseudo-likelihood. Its standard error takes reads as independent. It sums the samples up; it does not say that they are thermal. Of more than two million spins some rows are left out by lot, drawn from the run sheet’s seed.',
    result: ({ temperature }) => formatSignificant(temperature),
    sources: () => [BESAG],
    caution: ({ rehearsal }) => (rehearsal ? CAUTIONS.rehearsal : undefined),
  }),
  gaugeTest: entry<{ of: string; statistic: number; degrees: number; adjusted: number }>({
    inputs: ({ statistic, degrees }) => [
      { symbol: 'X', name: 'statistic', value: statistic },
      { symbol: 'f', name: 'degrees of freedom', value: degrees },
    ],
    method: ({ of }) =>
      `${of === 'energies' ? 'Kruskal and Wallis’s test on the ranks of the decoded energies' : 'The chi-squared test of homogeneity on reads by gauge'}: the chance that gauges which do not differ give as large a statistic, or a larger one, adjusted for the tests made together (Holm 1979). Reads are taken as independent.`,
    result: ({ adjusted }) => chance(adjusted),
    sources: ({ of }) => [of === 'energies' ? KRUSKAL_WALLIS : PEARSON],
  }),
  scaleFall: entry<{ fall: number; beta: number; rehearsal: boolean }>({
    inputs: ({ beta }) => [{ symbol: 'β', name: 'effective inverse temperature', value: beta }],
    method: () =>
      'To first order the mean energy falls by β · variance of the programmed energy / scale · ln 1.1 when the scale rises by a tenth, if the samples are thermal and their temperature stays.',
    result: ({ fall }) => formatSignificant(fall),
    sources: () => [DEFINITION],
    caution: ({ rehearsal }) => (rehearsal ? CAUTIONS.rehearsal : undefined),
  }),
}
