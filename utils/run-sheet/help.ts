import type { ChainRow, RuleView, RunSheetView } from '#shared/schemas/run-sheets'
import type { HelpCase, HelpRequest } from '../help/registry'
import { strengthText } from './strength'
import { splitDuration } from '../formatTime'

/** How the numbers of a run sheet are computed: what each was reckoned from. */

export interface Help {
  help?: HelpRequest
  cases?: () => HelpCase[]
  casesOf?: string
}

const BY_CHAIN = 'chain'
const breakable = ({ chains }: Pick<RunSheetView, 'chains'>): ChainRow[] => chains.filter(({ qubits }) => qubits > 1)

/** The strength by one rule; rules that give every chain its own are told chain by chain. */
export function strengthHelp(sheet: RunSheetView, { rule, value, k }: RuleView): Help {
  const { ising } = sheet
  if (rule === 'manual') return { help: { id: 'strengthEntered', given: { text: strengthText(k) } } }
  if (value === null) return {}
  if (rule === 'fixed' || rule === 'rms') return { help: { id: 'strength', given: { rule, value, ising } } }
  return {
    cases: () =>
      breakable(sheet).map((chain) => ({
        label: chain.label,
        help: { id: 'strength', given: { rule, value, ising, chain } },
      })),
    casesOf: BY_CHAIN,
  }
}

export const scaleHelp = ({ scaleLimit }: Pick<RuleView, 'scaleLimit'>): Help => ({
  help: { id: 'scale', given: { limit: scaleLimit } },
})

const totalOf = (bins: readonly { count: number }[]): number => bins.reduce((sum, { count }) => sum + count, 0)

/** The share of programmed values under 2σ; nothing where the machine states no control error. */
export function sigmaHelp(
  { sigmaH, sigmaJ, fieldSizes, couplingSizes }: RunSheetView['precision'],
  what: 'couplings' | 'fields',
  share: number | null,
): Help {
  if (share === null) return {}
  const total = totalOf(what === 'fields' ? fieldSizes : couplingSizes)
  const sigma = what === 'fields' ? sigmaH : sigmaJ
  return { help: { id: 'underTwoSigma', given: { what, sigma, total, under: Math.round(share * total) } } }
}

export const belowBoundHelp = ({ chains }: RunSheetView, { chainsBelowCutBound: below }: RuleView): Help => ({
  help: { id: 'chainsBelowBound', given: { below, chains: chains.length } },
})

export function noiseHelp({ chains, precision, scale }: RunSheetView): Help {
  const { sigmaH, sigmaJ, couplingSizes } = precision
  const qubits = chains.reduce((sum, chain) => sum + chain.qubits, 0)
  return { help: { id: 'energyNoise', given: { qubits, couplers: totalOf(couplingSizes), sigmaH, sigmaJ, scale } } }
}

/** @param show the total, given in milliseconds */
function timeGiven({ settings, machineTime }: RunSheetView, show: (milliseconds: number) => string, unit: string) {
  const { gauges, reads, annealMicroseconds: anneal } = settings
  return { gauges, reads, anneal, timing: machineTime.timing, show, unit }
}

/** The whole estimate, as the table shows it: in milliseconds. */
export const totalTimeHelp = (sheet: RunSheetView, show: (milliseconds: number) => string): HelpRequest => ({
  id: 'machineTime',
  given: timeGiven(sheet, show, 'ms'),
})

/** The whole estimate, in the unit that the strip of facts chose. */
export function timeHelp(sheet: RunSheetView): Help {
  const { unit } = splitDuration(sheet.machineTime.totalMilliseconds / 1000)
  const show = (milliseconds: number) => splitDuration(milliseconds / 1000).value
  return { help: { id: 'machineTime', given: timeGiven(sheet, show, unit) } }
}

export const boundCases = (chains: readonly ChainRow[]): HelpCase[] =>
  breakable({ chains: [...chains] }).flatMap(({ label, cutSplit, cutBoundExact: exact }) =>
    cutSplit ? [{ label, help: { id: 'cutBound', given: { ...cutSplit, exact } } }] : [],
  )

export const ratioCases = (chains: readonly ChainRow[]): HelpCase[] =>
  chains.flatMap(({ label, strength, cutBound: bound, qubits }) =>
    qubits > 1 && bound > 0 ? [{ label, help: { id: 'strengthOverBound', given: { strength, bound } } }] : [],
  )

/** The strength of every chain by the rule in force. */
export function chainStrengthHelp(sheet: RunSheetView): Help {
  const chosen = sheet.rules.find(({ selected }) => selected)
  return chosen ? strengthHelp(sheet, chosen) : {}
}
