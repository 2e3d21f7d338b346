import type { PublishedFamily } from '../fabric'
import { chimera } from './chimera'
import { cubic } from './cubic'
import { heavyHex } from './heavy-hex'
import { king } from './king'
import { pegasus } from './pegasus'
import type { FamilyOf, FamilyRules } from './rules'
import { square } from './square'
import { zephyr } from './zephyr'

const REGISTRY: { readonly [K in PublishedFamily['kind']]: FamilyRules<FamilyOf<K>> } = {
  chimera,
  pegasus,
  zephyr,
  king,
  square,
  cubic,
  'heavy-hex': heavyHex,
}

/** The rules of a family's kind. The kinds of the two match, which the type system cannot follow through a look-up. */
export const rulesOf = (family: PublishedFamily): FamilyRules<PublishedFamily> =>
  REGISTRY[family.kind] as FamilyRules<PublishedFamily>
