import { geometryOf } from '../../shared/engine/machine/geometry'
import type { MachineCapacity } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'
import { Recent } from './recent'

/** The same for every machine, so that machines can be compared. */
const SEARCH = { seed: 1, tries: 6, timeLimitSeconds: 60 } as const

/** By machine and calibration, which never change; what is being worked out is waited for by all who ask for it. */
const capacities = new Recent<Promise<MachineCapacity>>(64)

async function workOut(app: App, { graph, usable, fabric, calibration }: CalibratedMachine): Promise<MachineCapacity> {
  const machine = { machine: graph, usable, ...geometryOf(fabric) }
  const capacity = await app.compute.run('completeCapacity', { machine, ...SEARCH })
  return { calibration: calibration.number, ...capacity }
}

/** The largest complete graph that the templates place on a machine, and an upper bound on its treewidth. */
export async function machineCapacity(
  app: App,
  actor: Actor,
  id: string,
  calibration?: number,
): Promise<MachineCapacity> {
  const machine = await calibratedMachine(app, actor, id, calibration)
  const key = `${id} ${machine.calibration.number}`
  const capacity = capacities.get(key, () => workOut(app, machine))
  try {
    const answer = await capacity
    // Cut short by a busy machine, it may come further the next time.
    if (answer.stoppedEarly) capacities.drop(key, capacity)
    return answer
  } catch (error) {
    capacities.drop(key, capacity)
    throw error
  }
}
