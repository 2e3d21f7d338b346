import type { Evidence } from './evidence'
import { moreGauges } from './gauges'
import type { AdviceItem } from './item'
import { lowerAll } from './lower-all'
import { moreReads } from './more-reads'
import { pauseAdvice } from './pause'
import { strongPenalties, weakPenalties } from './penalties'
import { precisionAdvice } from './precision'
import { raiseAll } from './raise-all'
import { raiseNamed } from './raise-named'
import { reEmbed } from './re-embed'
import { scaleAdvice } from './scale'
import { suspectParts } from './suspects'

const RULES: readonly ((evidence: Evidence) => AdviceItem[])[] = [
  raiseNamed,
  suspectParts,
  raiseAll,
  weakPenalties,
  reEmbed,
  scaleAdvice,
  lowerAll,
  precisionAdvice,
  moreGauges,
  strongPenalties,
  moreReads,
  pauseAdvice,
]

/**
 * What to change next, the weightiest first (docs/formulas.md, Advice on returned samples). Each rule gives at most one
 * item, and none without its evidence; nothing is advised without a single read.
 */
export function adviceFor(evidence: Evidence): AdviceItem[] {
  if (evidence.reads === 0) return []
  return RULES.flatMap((rule) => rule(evidence)).sort((a, b) => b.weight - a.weight)
}
