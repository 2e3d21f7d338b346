import type { StructureView } from '#shared/schemas/problems'
import type { MachinePrecision, StructureDetailsView } from '#shared/schemas/structure'
import { formatCount, formatNumber, formatPercent } from '../format'
import type { HelpRequest } from '../help/registry'

/** One line of the structure report. */
export interface StructureLine {
  readonly label: string
  readonly value: string
  /** What it means, in a sentence. */
  readonly note?: string
  readonly help?: HelpRequest
}

/** Different sizes of components that are named. */
const MOST_SIZES = 5

function treewidthLine(details: StructureDetailsView, upper: number | null): StructureLine {
  const { treewidthLowerBound: bound, variables, interactions } = details
  const help: HelpRequest = { id: 'treewidthBelow', given: { variables, interactions, bound } }
  const low = formatNumber(bound)
  if (upper === null)
    return {
      label: 'Treewidth',
      value: `≥ ${low}`,
      note: 'No upper bound was sought: the graph is too large for a quick one.',
      help,
    }
  const isKnown = bound === upper
  return {
    label: 'Treewidth',
    value: isKnown ? low : `${low} to ${formatNumber(upper)}`,
    note: isKnown ? 'Both bounds meet: this is the treewidth.' : undefined,
    help,
  }
}

function componentsLine({ componentSizes }: StructureDetailsView, components: number): StructureLine {
  const named = componentSizes
    .slice(0, MOST_SIZES)
    .map(({ variables, count }) => `${formatNumber(count)} of ${formatCount(variables, 'variable')}`)
  const rest = componentSizes.slice(MOST_SIZES).reduce((sum, { count }) => sum + count, 0)
  if (rest > 0) named.push(`${formatNumber(rest)} smaller`)
  return {
    label: 'Components',
    value: formatNumber(components),
    note: components > 1 ? `${named.join(', ')}. They can be solved apart.` : undefined,
  }
}

const signsText = ({ negative, positive }: StructureDetailsView['couplings']): string =>
  `${formatNumber(negative)} below zero, ${formatNumber(positive)} above`

function frustrationLine({ balanced, triangles, couplings }: StructureDetailsView): StructureLine | null {
  if (couplings.negative + couplings.positive === 0) return null
  const counted =
    triangles && triangles.count > 0
      ? ` Of ${formatCount(triangles.count, 'triangle')}, ${formatNumber(triangles.frustrated)} (${formatPercent(triangles.frustrated / triangles.count)}) cannot be satisfied whole.`
      : ''
  return balanced
    ? { label: 'Frustration', value: 'none', note: 'One state satisfies every coupling; only fields can oppose it.' }
    : { label: 'Frustration', value: 'frustrated', note: `No state satisfies every coupling.${counted}` }
}

function degeneracyLine({ symmetries }: StructureDetailsView): StructureLine {
  const { free, mirrored, interchangeable } = symmetries
  const notes = [
    mirrored > 0 &&
      `${formatCount(mirrored, 'component')} without fields: turning over all its spins keeps the energy, so optima come in pairs.`,
    free > 0 && `${formatCount(free, 'variable')} without any coefficient: either value is as good.`,
    interchangeable.sets > 0 &&
      `${formatCount(interchangeable.variables, 'variable')} in ${formatCount(interchangeable.sets, 'set')} whose members can trade values, up to ${formatNumber(interchangeable.largest)} a set.`,
  ].filter((note) => note !== false)
  return {
    label: 'Several optima',
    value: notes.length > 0 ? 'to be expected' : 'no sign',
    note: notes.join(' ') || undefined,
  }
}

/** The slower figures of the structure report, line by line. */
export function structureLines(details: StructureDetailsView, structure: StructureView): StructureLine[] {
  const { distinct, fields, couplings } = details
  const lines: (StructureLine | null)[] = [
    treewidthLine(details, structure.treewidthUpperBound),
    componentsLine(details, structure.components),
    structure.isolated > 0
      ? {
          label: 'Isolated variables',
          value: formatNumber(structure.isolated),
          note: 'Without interactions: the sign of their field decides them.',
        }
      : null,
    {
      label: 'Distinct values',
      value: `${formatNumber(distinct.interactions)} of interactions, ${formatNumber(distinct.linear)} of fields`,
    },
    { label: 'Signs of J', value: signsText(couplings) },
    { label: 'Signs of h', value: `${signsText(fields)}, ${formatNumber(fields.zero)} zero` },
    frustrationLine(details),
    degeneracyLine(details),
  ]
  return lines.filter((line) => line !== null)
}

export const underOf = ({ fieldsUnder, interactionsUnder }: MachinePrecision): number => fieldsUnder + interactionsUnder

export function underHelp(machine: MachinePrecision): HelpRequest {
  const { machine: name, fieldsUnder, interactionsUnder, coefficients, sigmaH, sigmaJ, scale } = machine
  return { id: 'underNoise', given: { name, fieldsUnder, interactionsUnder, coefficients, sigmaH, sigmaJ, scale } }
}

/** What the dynamic range means on a machine, in one sentence. */
export function precisionSentence(machine: MachinePrecision): string {
  const { machine: name, coefficients, sigmaH, sigmaJ } = machine
  if (sigmaH === 0 && sigmaJ === 0) return `The sheet of ${name} states no control error.`
  const under = underOf(machine)
  const of = `Of ${formatCount(coefficients, 'coefficient')}, `
  if (under === 0) return `${of}none is smaller than 2σ once the largest fits the range of ${name}.`
  const verb = under === 1 ? 'is' : 'are'
  return `${of}${formatNumber(under)} ${verb} smaller than 2σ once the largest fits the range of ${name}: control error can turn their sign.`
}
