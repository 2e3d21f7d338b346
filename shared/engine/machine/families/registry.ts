import type { Family } from '../fabric'
import { chimera } from './chimera'
import { king } from './king'
import { pegasus } from './pegasus'
import type { FamilyOf, FamilyRules } from './rules'
import { square } from './square'
import { zephyr } from './zephyr'

const REGISTRY: { readonly [K in Family['kind']]: FamilyRules<FamilyOf<K>> } = {
  chimera,
  pegasus,
  zephyr,
  king,
  square,
}

/** The rules of a family's kind. The kinds of the two match, which the type system cannot follow through a look-up. */
export const rulesOf = (family: Family): FamilyRules<Family> => REGISTRY[family.kind] as FamilyRules<Family>
