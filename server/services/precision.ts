import { energyNoise } from '../../shared/engine/programming/precision'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { RunSheetView } from '../../shared/schemas/run-sheets'
import type { Bench } from './programming'

export const controlErrorOf = ({ machine }: Bench) => {
  const { h: sigmaH, J: sigmaJ } = machine.sheet.controlError
  return { sigmaH, sigmaJ }
}

const shareUnder = (sizes: Float64Array, sigma: number): number | null =>
  sigma === 0 || sizes.length === 0 ? null : sizes.filter((size) => size < 2 * sigma).length / sizes.length

/** What the machine's control error does to the programmed values, in a few figures. */
export function precisionOf(bench: Bench, programmed: Programmed): RunSheetView['precision'] {
  const error = controlErrorOf(bench)
  const fields = programmed.h.map(Math.abs).filter((size) => size > 0)
  const couplings = programmed.J.filter((_, c) => !programmed.isChainCoupler[c]).map(Math.abs)
  return {
    ...error,
    fieldsUnderTwoSigma: shareUnder(fields, error.sigmaH),
    couplingsUnderTwoSigma: shareUnder(couplings, error.sigmaJ),
    energyNoise: energyNoise(programmed, error).ofOrder,
    fields: fields.length,
    couplings: couplings.length,
  }
}
