import type { ChainEvidence, Evidence } from '../../../../../shared/engine/readout/advice/evidence'

/** Twenty chains that hold, above their bounds. */
export const chains: ChainEvidence[] = Array.from({ length: 20 }, (_, i) => ({
  variable: i,
  label: `x${i}`,
  length: 3,
  strength: 2,
  bound: 1.5,
  breaks: 2,
}))

/** The same with some chains changed. */
export const chainsWith = (changes: Record<number, Partial<ChainEvidence>>): ChainEvidence[] =>
  chains.map((chain, i) => ({ ...chain, ...changes[i] }))

/** A return that nothing is to be advised on. */
export const quiet: Evidence = {
  reads: 1000,
  readsDecoded: 1000,
  chains,
  scale: { value: 0.5, greatest: 0.5, isLimitedByChains: true, isChosen: false },
  precision: {
    isKnown: true,
    coefficients: 30,
    underTwoSigma: 0,
    smallest: 0.5,
    blur: 0.2,
    blurWithOneCoupler: null,
  },
  asked: { reads: 1000, gauges: 10 },
  gaugeTests: [
    { of: 'breaks', adjusted: 0.4 },
    { of: 'energies', adjusted: 0.02 },
  ],
  success: { target: 'reference', successes: 100, trials: 1000 },
  suspects: { qubits: [], couplers: [] },
  groups: [],
  largest: { withinGroups: 0, elsewhere: 2 },
  pause: null,
  temperature: null,
}
