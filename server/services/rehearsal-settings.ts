import { energiesAt } from '../../shared/engine/machine/energies-at'
import type { Programmed } from '../../shared/engine/programming/programme'
import { programmedTemperature } from '../../shared/engine/sampling/anneal-path'
import { ANNEAL_DEFAULTS } from '../../shared/engine/sampling/annealing-schedule'
import type { Arithmetic } from '../../shared/engine/sampling/arithmetic'
import { fittingArithmetic, roundingIn, roundingsOf } from '../../shared/engine/sampling/arithmetic'
import { physicalModel } from '../../shared/engine/sampling/physical-model'
import { DomainError } from '../../shared/errors'
import type { MachineSheet } from '../../shared/schemas/machines'
import type { Rehearse, RehearsalChoices } from '../../shared/schemas/run-sheets'

/** What made the samples of a rehearsal, kept with them. */
export interface RehearsalSettings extends Record<string, string | number | boolean | null> {
  model: Rehearse['model']
  reads: number
  sweeps: number
  /** Final temperature in units of the programmed values; of path-integral Monte Carlo the machine's at s = 1. */
  temperature: number
  /** How numbers were held, and the most that any value is off, in programmed units. */
  arithmetic: Arithmetic
  rounding: number
  controlError: boolean
  sigmaH: number
  sigmaJ: number
  /** Of path-integral Monte Carlo, else null: Trotter slices. Its schedule is the run sheet's. */
  slices: number | null
  seed: number
}

/** What a rehearsal on this machine can be made of. */
export function rehearsalChoices(programmed: Programmed, sheet: MachineSheet): RehearsalChoices {
  const { temperatureMillikelvin: millikelvin, energyTable } = sheet
  const temperature = millikelvin && energyTable ? programmedTemperature(millikelvin, energyTable) : null
  return {
    ...roundingsOf(physicalModel(programmed)),
    physical:
      temperature === null ? null : { temperature, millikelvin: millikelvin!, B: energiesAt(energyTable!, 1).B },
  }
}

const refusal = (code: string, path: string, message: string): DomainError =>
  new DomainError('not acceptable', code, message, [{ path, message }])

/** Everything that decides the samples, worked out once: the job asks nothing but this. */
export function rehearsalSettings(input: Rehearse, programmed: Programmed, sheet: MachineSheet): RehearsalSettings {
  const { model, reads, sweeps, controlError, seed } = input
  const { h: sigmaH, J: sigmaJ } = sheet.controlError
  const choices = rehearsalChoices(programmed, sheet)
  const common = { model, reads, sweeps, controlError, sigmaH, sigmaJ, seed }
  if (model === 'path-integral') {
    const message = 'Path-integral Monte Carlo needs the temperature and the energy table of the machine sheet.'
    if (!choices.physical) throw refusal('rehearsal.energy-table', 'model', message)
    const { temperature } = choices.physical
    return { ...common, temperature, arithmetic: '64-bit', rounding: 0, slices: input.slices }
  }
  const temperature = input.temperature ?? ANNEAL_DEFAULTS.temperature
  const error = controlError ? { sigmaH, sigmaJ } : null
  const arithmetic =
    input.arithmetic === 'automatic' ? fittingArithmetic(choices, error, temperature) : input.arithmetic
  const rounding = roundingIn(choices, arithmetic)
  if (rounding === Infinity)
    throw refusal('rehearsal.arithmetic', 'arithmetic', 'A qubit has too many couplings for 16 bits. Choose 32.')
  return { ...common, temperature, arithmetic, rounding, slices: null }
}
