import type { Control } from '../../../shared/engine/control'
import { machineTreewidthBound } from '../../../shared/engine/embedding/feasibility'
import type { MachineInput } from '../../../shared/engine/embedding/templates/capacity'
import { largestCompleteGraph } from '../../../shared/engine/embedding/templates/capacity'
import type { MachineCapacity } from '../../../shared/schemas/machines'

export interface CompleteCapacityInput {
  machine: MachineInput
  seed: number
  tries: number
  /** After this the largest found so far is answered. */
  timeLimitSeconds: number
}

/** The largest complete graph that the templates place, and a proved bound on the machine's treewidth. */
export function completeCapacity(
  { machine, seed, tries, timeLimitSeconds }: CompleteCapacityInput,
  control: Control<never>,
): Omit<MachineCapacity, 'calibration'> {
  const end = control.now() + timeLimitSeconds
  let stoppedEarly = false
  const cancelled = (): boolean => (stoppedEarly ||= control.cancelled() || control.now() >= end)
  const treewidth = machineTreewidthBound(machine).width
  const found = largestCompleteGraph(machine, seed, { tries, cancelled })
  const complete = found && { order: found.order, chainLength: found.chainLength }
  return { treewidth, complete, seed, tries, stoppedEarly }
}
