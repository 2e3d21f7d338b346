import type { Family } from '../../shared/engine/machine/fabric'
import type { Problem } from '../../shared/engine/problem/problem'
import type { MachineTimeEstimate } from '../../shared/engine/programming/machine-time'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { MachineSheet } from '../../shared/schemas/machines'
import type { RunSheetSettings } from '../../shared/schemas/run-sheets'

/**
 * All that a bundle is written from: things that stand still from approval on, so that the same run sheet gives the same
 * bytes whenever it is asked. Names that people may change later (of the problem, of persons) and states are left out.
 */
export interface BundleInput {
  sheet: { number: number; name: string; settings: RunSheetSettings }
  problem: { number: number; version: number; sense: 'min' | 'max' }
  labels: string[]
  /** The Ising form, to be minimised. */
  ising: Problem
  embedding: { number: number }
  /** Published qubit numbers of every variable's chain, in the order of the labels. */
  chains: number[][]
  machine: { name: string; family: Family; calibration: number; sheet: MachineSheet }
  programmed: Programmed
  /** Published qubit number of every position of the programmed problem. */
  qubitIds: number[]
  fingerprints: { problem: string; embedding: string; programmed: string }
  estimate: MachineTimeEstimate
}
