import type { Interval } from '../intervals'

/** What happened to one chain of two or more qubits. */
export interface ChainEvidence {
  readonly variable: number
  readonly label: string
  /** Qubits. */
  readonly length: number
  /** k, and the bound above which no unbroken ground state gains by a break; both in units of the Ising form. */
  readonly strength: number
  readonly bound: number
  /** Reads in which it broke. */
  readonly breaks: number
}

export interface GroupEvidence {
  readonly name: string
  /** The group does not hold in the best assignment found. */
  readonly isBrokenInBest: boolean
  /** Decoded reads that break it. */
  readonly violations: number
  /** P, and the P that is enough by the bound; null where the coefficients do not tell. */
  readonly weight: number | null
  readonly sufficient: number | null
}

/** Everything that rules look at. Null or empty where there is nothing to say: a rule without its evidence is silent. */
export interface Evidence {
  readonly reads: number
  /** Reads that the decoding keeps. */
  readonly readsDecoded: number
  readonly chains: readonly ChainEvidence[]
  readonly scale: {
    readonly value: number
    /** The greatest that fits the ranges with the strengths as they are. */
    readonly greatest: number
    /** A chain coupling is what keeps it from being greater. */
    readonly isLimitedByChains: boolean
    /** Chosen by a person rather than fitted. */
    readonly isChosen: boolean
  }
  readonly precision: {
    /** The machine states a control error. */
    readonly isKnown: boolean
    /** Logical coefficients that are not 0, and those of them under 2σ when programmed. */
    readonly coefficients: number
    readonly underTwoSigma: number
    /** Least size of them, and how far control error blurs the order of energies, one σ; in units of the problem. */
    readonly smallest: number
    readonly blur: number
    /** The same blur with one coupler an interaction; null where that is how it is. */
    readonly blurWithOneCoupler: number | null
  }
  /** What the run sheet asks for. */
  readonly asked: { readonly reads: number; readonly gauges: number }
  /** Tests between gauges, adjusted for being several; those that can be relied on. */
  readonly gaugeTests: readonly { readonly of: string; readonly adjusted: number }[]
  /** Reads at the target: the reference within the gap, or the best found. */
  readonly success: {
    readonly target: 'reference' | 'best found'
    readonly successes: number
    readonly trials: number
  } | null
  /** Parts of the machine in use that break far oftener than their like; published numbers. */
  readonly suspects: { readonly qubits: readonly number[]; readonly couplers: readonly (readonly [number, number])[] }
  readonly groups: readonly GroupEvidence[]
  /** Largest coefficient of the QUBO between members of one group, and among all others; 0 where there is none. */
  readonly largest: { readonly withinGroups: number; readonly elsewhere: number }
  /** Of a problem with few spins, annealed straight; frequencies in GHz. */
  readonly pause: { readonly s: number; readonly gap: number; readonly gapAt: number; readonly kT: number } | null
  /** What a greater scale would do, at the temperature that the samples look to have; energies in units of the problem. */
  readonly temperature: {
    readonly value: number
    readonly interval: Interval | null
    readonly fallAtGreatest: number
    readonly standardError: number
  } | null
}
