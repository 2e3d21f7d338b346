import type { Fabric, Family, PublishedFamily } from '../fabric'

/** One size of a family, with the least value it can take. */
export interface FamilySize {
  readonly field: string
  readonly least: number
}

/** What a machine graph is called and how large it is. */
export interface FamilyFigures<F extends Family> {
  name(family: F): string
  /** Closed form: never builds the graph, and may exceed every limit. */
  qubitCount(family: F): number
  /** Closed form, as above. */
  couplerCount(family: F): number
}

/** All that the rest of the engine needs to know about one family. */
export interface FamilyRules<F extends PublishedFamily> extends FamilyFigures<F> {
  readonly sizes: readonly FamilySize[]
  /** @param family sizes already checked */
  build(family: F): Omit<Fabric, 'family'>
}

export type FamilyOf<K extends PublishedFamily['kind']> = Extract<PublishedFamily, { kind: K }>
