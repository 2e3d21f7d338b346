import type { Control } from '../../../shared/engine/control'
import type { Programmed } from '../../../shared/engine/programming/programme'
import type { BreaksOnMachine, JudgedMachine } from '../../../shared/engine/readout/judge-machine'
import { judgeMachine } from '../../../shared/engine/readout/judge-machine'
import type { PartBreaks } from '../../../shared/engine/readout/part-breaks'
import { partBreaks } from '../../../shared/engine/readout/part-breaks'
import type { BreakStatistics } from '../../../shared/engine/readout/breaks'

/** Breaks of one set of samples by qubit and coupler. */
export const countPartBreaks = (
  { breaks, programmed }: { breaks: BreakStatistics; programmed: Programmed },
  _control: Control<never>,
): PartBreaks => partBreaks(breaks, programmed)

/** Breaks of several returns together, each part beside its neighbours. */
export const judgeBreaks = (input: BreaksOnMachine, _control: Control<never>): JudgedMachine => judgeMachine(input)
