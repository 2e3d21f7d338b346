import type { Programmed } from '../programming/programme'
import { spinOf } from '../sampling/samples'
import type { SampleRows } from '../sampling/samples'

/** What the energies that came with samples are energies of. */
export type EnergyMeaning =
  /** Σ h·s + Σ J·s·s in programmed units. */
  | 'programmed'
  /** The same with the programme's offset: scaled, of the problem where no chain is broken. */
  | 'programmed with offset'
  /** In units of the Ising form, chain couplings included: the problem's own where no chain is broken. */
  | 'problem'
  /** The same, of a problem that is maximised, in its own sense. */
  | 'problem, maximised'

/** Why energies may disagree: what was done to the rows or to the values if they agree after it is undone. */
export type EnergyCause =
  /** Energies of −s: up and down are exchanged, or fields have the other sign. */
  | 'spins or fields reversed'
  /** −E: another sign convention of the whole energy. */
  | 'energy negated'
  /** Couplings have the other sign. */
  | 'couplings reversed'
  /** Rows as they were read under their gauge. */
  | 'gauge not undone'
  /** Rows whose gauge had been undone already were turned once more. */
  | 'gauge undone twice'
  /** All energies are off by the same amount. */
  | 'constant offset'
  /** None of these: another calibration or other settings were programmed, or rows and energies do not belong together. */
  | 'unknown'

export interface EnergyAgreement {
  /** Rows that were looked at. */
  readonly rows: number
  /** Of them those that agree under the meaning or the cause given. */
  readonly agreeing: number
  /** Null where the energies disagree. */
  readonly meaning: EnergyMeaning | null
  /** Null where they agree. */
  readonly cause: EnergyCause | null
  /** Largest difference from the programmed energy over the rows looked at. */
  readonly worst: number
  /** What difference still counts as equal. */
  readonly tolerance: number
}

/**
 * `tolerance`: of the sum of all sizes; clients commonly answer energies in single precision (common practice). `share`:
 * of the rows that must agree. `rows`: looked at, evenly spread.
 */
const DEFAULTS = { tolerance: 1e-5, share: 0.99, rows: 2000 }

/** Σ h·s and Σ J·s·s of a row. */
function partsOf({ h, ends, J }: Programmed, spins: Int8Array): { fields: number; couplings: number } {
  let fields = 0
  let couplings = 0
  for (let p = 0; p < h.length; p++) fields += h[p]! * spins[p]!
  for (let c = 0; c < J.length; c++) couplings += J[c]! * spins[ends[2 * c]!]! * spins[ends[2 * c + 1]!]!
  return { fields, couplings }
}

interface Rows {
  given: Float64Array
  fields: Float64Array
  couplings: Float64Array
  /** The energy of the row turned by its gauge; NaN where no gauge is known. */
  turned: Float64Array
}

function looked(
  samples: SampleRows,
  programmed: Programmed,
  signsOf: ((gauge: number) => Int8Array) | null,
): Rows & { count: number } {
  const count = Math.min(samples.rows, DEFAULTS.rows)
  const list = (): Float64Array => new Float64Array(count)
  const rows = { given: list(), fields: list(), couplings: list(), turned: list().fill(Number.NaN) }
  const spins = new Int8Array(samples.width)
  for (let k = 0; k < count; k++) {
    const r = Math.floor((k * samples.rows) / count)
    for (let p = 0; p < spins.length; p++) spins[p] = spinOf(samples, r, p)
    const { fields, couplings } = partsOf(programmed, spins)
    rows.given[k] = samples.energies![r]!
    rows.fields[k] = fields
    rows.couplings[k] = couplings
    if (!signsOf || !samples.gauges) continue
    const signs = signsOf(samples.gauges[r]!)
    for (let p = 0; p < spins.length; p++) spins[p] = spins[p]! * signs[p]!
    const turned = partsOf(programmed, spins)
    rows.turned[k] = turned.fields + turned.couplings
  }
  return { ...rows, count }
}

/** The values shifted so that their first row fits: their spread is what is compared. */
function shifted(rows: Rows): (k: number) => number {
  const shift = rows.given[0]! - rows.fields[0]! - rows.couplings[0]!
  return (k) => rows.fields[k]! + rows.couplings[k]! + shift
}

/**
 * Compares energies that came with samples with what the programmed problem gives, and where they disagree says what
 * would explain it.
 * @param samples rows in the order of `programmed.qubits`, with energies
 * @param turn signs of a gauge by its number, and whether the rows were turned by it already; null without gauges
 */
export function energyAgreement(
  samples: SampleRows,
  programmed: Programmed,
  turn: { readonly signsOf: (gauge: number) => Int8Array; readonly isDone: boolean } | null,
): EnergyAgreement {
  const rows = looked(samples, programmed, turn && turn.signsOf)
  const { count, given, fields, couplings, turned } = rows
  const { scale, offset, h, J } = programmed
  const size = [...h, ...J].reduce((sum, value) => sum + Math.abs(value), Math.abs(offset))
  const physical = (k: number): number => fields[k]! + couplings[k]!
  // Energies in the problem's units differ by 1/scale more.
  const agreeing = (energy: (k: number) => number, unit = 1): number => {
    const tolerance = (DEFAULTS.tolerance * size) / unit
    let agree = 0
    for (let k = 0; k < count; k++) if (Math.abs(energy(k) - given[k]!) <= tolerance) agree++
    return agree
  }
  const least = DEFAULTS.share * count
  let worst = 0
  for (let k = 0; k < count; k++) worst = Math.max(worst, Math.abs(physical(k) - given[k]!))
  const common = { rows: count, worst, tolerance: DEFAULTS.tolerance * size }
  const meanings: [EnergyMeaning, (k: number) => number, number?][] = [
    ['programmed', physical],
    ['programmed with offset', (k) => physical(k) + offset],
    ['problem', (k) => (physical(k) + offset) / scale, scale],
    ['problem, maximised', (k) => -(physical(k) + offset) / scale, scale],
  ]
  for (const [meaning, energy, unit] of meanings) {
    const agree = agreeing(energy, unit)
    if (agree >= least) return { ...common, agreeing: agree, meaning, cause: null }
  }
  const causes: [EnergyCause, (k: number) => number][] = [
    [turn?.isDone ? 'gauge undone twice' : 'gauge not undone', (k) => turned[k]!],
    ['spins or fields reversed', (k) => couplings[k]! - fields[k]!],
    ['energy negated', (k) => -physical(k)],
    ['couplings reversed', (k) => fields[k]! - couplings[k]!],
    ['constant offset', shifted(rows)],
  ]
  for (const [cause, energy] of causes) {
    const agree = agreeing(energy)
    if (agree >= least) return { ...common, agreeing: agree, meaning: null, cause }
  }
  return { ...common, agreeing: agreeing(physical), meaning: null, cause: 'unknown' }
}
