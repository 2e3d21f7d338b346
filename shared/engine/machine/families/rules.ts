import type { Fabric, Family } from '../fabric'

/** One size of a family, with the least value it can take. */
export interface FamilySize {
  readonly field: string
  readonly least: number
}

/** All that the rest of the engine needs to know about one family. */
export interface FamilyRules<F extends Family> {
  readonly sizes: readonly FamilySize[]
  name(family: F): string
  /** Closed form: never builds the graph, and may exceed every limit. */
  qubitCount(family: F): number
  /** Closed form, as above. */
  couplerCount(family: F): number
  /** @param family sizes already checked */
  build(family: F): Omit<Fabric, 'family'>
}

export type FamilyOf<K extends Family['kind']> = Extract<Family, { kind: K }>
