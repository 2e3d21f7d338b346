import { groupDigits } from '../../shared/engine/digits'
import { MOST_SPINS } from '../../shared/engine/spectrum/spin-operator'
import { clusterSpins, logicalSpins } from '../../shared/engine/spectrum/spins'
import { DomainError } from '../../shared/errors'
import type { SpinsQuery, SpinsView } from '../../shared/schemas/spins'
import type { Actor, App } from '../app'
import { bestKnownState } from './best-state'
import { programmeBench, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'

function requireFew(spins: number, what: string, remedy: string): void {
  if (spins <= MOST_SPINS) return
  const message = `${what}: ${groupDigits(spins)} spins; the spectrum is worked out for at most ${MOST_SPINS}. ${remedy}`
  throw new DomainError('not acceptable', 'spins.too-many', message, [{ path: 'variables', message: 'too many spins' }])
}

/**
 * The spins of a run sheet's problem, or of chosen chains, with what is programmed on them.
 * @throws DomainError for unknown variables, for more spins than the spectrum is worked out for, and where other chains
 *   are to be held and no state is known
 */
export async function spinsOf(
  app: App,
  actor: Actor,
  runSheetId: string,
  { variables, outside }: SpinsQuery,
): Promise<SpinsView> {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const programmed = requireProgrammed(programmeBench(bench, sheet.settings))
  const { labels, ising, machine } = bench
  if (variables === null) {
    requireFew(ising.n, bench.problem.name, 'Choose some of its chains.')
    const { h, ends, J } = logicalSpins(ising, programmed.scale)
    return { names: labels, h: [...h], ends: [...ends], J: [...J], held: null }
  }
  const places = variables.map((label) => labels.indexOf(label))
  const unknown = variables.filter((_, k) => places[k]! < 0)
  if (unknown.length > 0)
    throw new DomainError('not acceptable', 'spins.variable', `The problem has no variable ${unknown.join(', ')}.`, [
      { path: 'variables', message: 'unknown variable' },
    ])
  const best = outside === 'held' ? await bestKnownState(app, actor, sheet.id, bench) : null
  const { model, positions } = clusterSpins(programmed, places, best?.spins ?? null)
  requireFew(positions.length, 'These chains', 'Choose fewer or shorter ones.')
  const names = Array.from(positions, (p) => {
    const qubit = machine.fabric.ids[programmed.qubits[p]!]!
    return `${labels[programmed.chainOf[p]!]!} at qubit ${qubit}`
  })
  return { names, h: [...model.h], ends: [...model.ends], J: [...model.J], held: best?.held ?? null }
}
