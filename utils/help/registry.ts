import { embeddingHelp } from './embedding'
import type { Explanation, HelpEntry } from './entry'
import { explainWith } from './entry'
import { machineHelp } from './machine'
import { optimumHelp } from './optimum'
import { precisionHelp } from './precision'
import { presolveHelp } from './presolve'
import { priceHelp } from './price'
import { problemHelp } from './problem'
import { programmingHelp } from './programming'
import { rehearsalHelp } from './rehearsal'
import { analysisHelp } from './analysis'
import { samplesHelp } from './samples'
import { structureHelp } from './structure'

/** Every number that the product computes and shows, and how. */
const HELP = {
  ...problemHelp,
  ...presolveHelp,
  ...optimumHelp,
  ...structureHelp,
  ...machineHelp,
  ...priceHelp,
  ...embeddingHelp,
  ...programmingHelp,
  ...precisionHelp,
  ...rehearsalHelp,
  ...analysisHelp,
  ...samplesHelp,
}

export type HelpId = keyof typeof HELP
type GivenOf<Id extends HelpId> = (typeof HELP)[Id] extends HelpEntry<infer Given> ? Given : never

/** A number to explain, with what it was computed from. */
export type HelpRequest = { [Id in HelpId]: { readonly id: Id; readonly given: GivenOf<Id> } }[HelpId]

/** One of several numbers that share a heading: the rate of one chain, the strength by one rule. */
export interface HelpCase {
  readonly label: string
  readonly help: HelpRequest
}

export const HELP_IDS = Object.keys(HELP) as HelpId[]

/** Formula, inputs, value, source and caution of a number. */
export function explain({ id, given }: HelpRequest): Explanation {
  // Id and what is given belong together by the type of the request; the compiler cannot follow that through a lookup.
  return explainWith(HELP[id] as HelpEntry<unknown>, given)
}
