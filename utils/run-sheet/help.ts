import type { ChainRow, RuleView, RunSheetView } from '#shared/schemas/run-sheets'
import type { HelpCase, HelpRequest } from '../help/registry'
import { strengthText } from './strength'
import { isBreakable } from './chains'
import { splitDuration } from '../formatTime'

/** How the numbers of a run sheet are computed: what each was reckoned from. */

export interface Help {
  help?: HelpRequest
  cases?: () => HelpCase[]
  casesOf?: string
}

const BY_CHAIN = 'chain'

/** The strength by one rule; rules that give every chain its own are told chain by chain, once the chains are there. */
export function strengthHelp({ ising }: RunSheetView, { rule, value, k }: RuleView, chains: readonly ChainRow[]): Help {
  if (rule === 'manual') return { help: { id: 'strengthEntered', given: { text: strengthText(k) } } }
  if (value === null) return {}
  if (rule === 'fixed' || rule === 'rms') return { help: { id: 'strength', given: { rule, value, ising } } }
  if (chains.length === 0) return {}
  return {
    cases: () =>
      chains.filter(isBreakable).map((chain) => ({
        label: chain.label,
        help: { id: 'strength', given: { rule, value, ising, chain } },
      })),
    casesOf: BY_CHAIN,
  }
}

export const scaleHelp = ({ scaleLimit }: Pick<RuleView, 'scaleLimit'>): Help => ({
  help: { id: 'scale', given: { limit: scaleLimit } },
})

/** The share of programmed values under 2σ; nothing where the machine states no control error. */
export function sigmaHelp(
  { sigmaH, sigmaJ, fields, couplings }: RunSheetView['precision'],
  what: 'couplings' | 'fields',
  share: number | null,
): Help {
  if (share === null) return {}
  const total = what === 'fields' ? fields : couplings
  const sigma = what === 'fields' ? sigmaH : sigmaJ
  return { help: { id: 'underTwoSigma', given: { what, sigma, total, under: Math.round(share * total) } } }
}

export const belowBoundHelp = ({ ising }: RunSheetView, { chainsBelowCutBound: below }: RuleView): Help => ({
  help: { id: 'chainsBelowBound', given: { below, chains: ising.variables } },
})

/** The smallest coefficient beside its σ, with the scale of a rule. */
export const smallestHelp = ({ smallest, scale }: Pick<RuleView, 'smallest' | 'scale'>): Help =>
  smallest ? { help: { id: 'coefficientOverSigma', given: { ...smallest, scale, smallest: true } } } : {}

/** The share of coefficients under 2σ. */
export function coefficientsHelp(
  { sigmaH, sigmaJ }: RunSheetView['precision'],
  { under, of }: { under: number; of: number },
): Help {
  return { help: { id: 'coefficientsUnder', given: { under, of, sigmaH, sigmaJ } } }
}

/** @param scale of the run sheet itself where it is left out */
export function noiseHelp({ chainTotals, precision, scale: own }: RunSheetView, scale = own): Help {
  const { sigmaH, sigmaJ, couplings } = precision
  const { qubits } = chainTotals
  return { help: { id: 'energyNoise', given: { qubits, couplers: couplings, sigmaH, sigmaJ, scale } } }
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

/** What the whole estimate costs; nothing where the machine sheet states no price. */
export const priceHelpOf = ({ totalMilliseconds: milliseconds, price }: RunSheetView['machineTime']): Help =>
  price
    ? { help: { id: 'machinePrice', given: { milliseconds, perSecond: price.perSecond, currency: price.currency } } }
    : {}

export const boundCases = (chains: readonly ChainRow[]): HelpCase[] =>
  chains
    .filter(isBreakable)
    .flatMap(({ label, cutSplit, cutBoundExact: exact }) =>
      cutSplit ? [{ label, help: { id: 'cutBound', given: { ...cutSplit, exact } } }] : [],
    )

export const ratioCases = (chains: readonly ChainRow[]): HelpCase[] =>
  chains.flatMap(({ label, strength, cutBound: bound, qubits }) =>
    qubits > 1 && bound > 0 ? [{ label, help: { id: 'strengthOverBound', given: { strength, bound } } }] : [],
  )

/** The strength of every chain by the rule in force. */
export function chainStrengthHelp(sheet: RunSheetView, chains: readonly ChainRow[]): Help {
  const chosen = sheet.rules.find(({ selected }) => selected)
  return chosen ? strengthHelp(sheet, chosen, chains) : {}
}
