import { chainOf } from '../../shared/engine/embedding/embedding'
import { DomainError } from '../../shared/errors'
import { FIXED_STATES } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { BundleInput } from '../bundle/input'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import type { Bench } from './programming'
import { fingerprintOf, programmeBench, requireProgrammed } from './programming'
import { qubitIdsOf } from './qubit-ids'
import { estimate } from './run-sheet-time'
import { benchOf, runSheetRow } from './run-sheets'

const NEXT: Partial<Record<RunSheetRow['state'], string>> = {
  draft: 'Submit it for review; the bundle is there once it is approved.',
  'sent back': 'Correct it and submit it again; the bundle is there once it is approved.',
  'in review': 'The bundle is there once a reviewer has approved it.',
}

/**
 * The ZIP archive by which an approved run sheet is run and checked, written in a thread. The same run sheet gives the
 * same bytes every time.
 * @throws DomainError wrong state before approval, or where this program no longer computes what was approved
 */
export async function bundleOf(app: App, actor: Actor, id: string): Promise<{ fileName: string; bytes: Uint8Array }> {
  const row = await runSheetRow(app, actor, id)
  if (!FIXED_STATES.includes(row.state))
    throw new DomainError('wrong state', 'bundle.state', `RS-${row.number} is ${row.state}. ${NEXT[row.state]}`)
  const input = inputOf(row, await benchOf(app, actor, row))
  if (input.fingerprints.programmed !== row.fingerprint)
    throw new DomainError(
      'wrong state',
      'bundle.fingerprint',
      `What is computed now for RS-${row.number} differs from what was approved. Duplicate it and have the copy approved.`,
    )
  return { fileName: `RS-${row.number}.zip`, ...(await app.compute.run('writeBundle', input)) }
}

function inputOf(row: RunSheetRow, bench: Bench): BundleInput {
  const { problem, labels, ising, embedding, machine } = bench
  const programmed = requireProgrammed(programmeBench(bench, row.settings))
  return {
    sheet: { number: row.number, name: row.name, settings: row.settings },
    problem: { number: problem.number, version: problem.version, sense: problem.sense },
    labels,
    ising,
    embedding: { number: bench.row.number },
    chains: labels.map((_, i) => Array.from(chainOf(embedding, i), (q) => machine.fabric.ids[q]!)),
    machine: {
      name: machine.machine.name,
      family: machine.machine.family,
      calibration: machine.calibration.number,
      sheet: machine.sheet,
    },
    programmed,
    qubitIds: qubitIdsOf(bench, programmed),
    fingerprints: {
      problem: problem.fingerprint,
      embedding: bench.row.fingerprint ?? '',
      programmed: fingerprintOf(programmed),
    },
    estimate: estimate(bench, row.settings),
  }
}
