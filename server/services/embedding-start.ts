import { chainOf } from '../../shared/engine/embedding/embedding'
import type { Start } from '../../shared/engine/embedding/task'
import type { Violation } from '../../shared/engine/embedding/verify'
import type { Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'
import type { CreateEmbedding } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import type { Subject } from './embedding-subject'
import { carriedChains, embeddingRow, frozenMask, taskOf } from './embedding-subject'

type StartInput = NonNullable<CreateEmbedding['start']>

const MOST_ISSUES = 200

const refuse = (code: string, message: string, issues: Issue[]): never => {
  throw new DomainError('not acceptable', code, message, issues.slice(0, MOST_ISSUES))
}

/** @throws DomainError when the embedding cannot be begun from, or what must stay cannot stay */
export async function startOf(app: App, actor: Actor, subject: Subject, input: StartInput): Promise<Start> {
  const row = await embeddingRow(app, actor, input.embeddingId)
  requireChains(row, subject)
  const chains = await carriedChains(app, subject, row)
  if (chains.qubits.length === 0)
    refuse(
      'embedding.start-variables',
      `E-${row.number} is of a problem that has no variable in common with ${subject.problem.name}.`,
      [{ path: 'start.embeddingId', message: 'no variable of its problem is one of this problem' }],
    )
  const start = { chains, frozen: frozenMask(subject.labels, input.frozen) }
  requireKnown(input.frozen, subject, start)
  const { violations } = await app.compute.run('checkEmbedding', {
    task: taskOf(subject, start),
    embedding: chains,
    labels: subject.labels,
    ids: subject.machine.fabric.ids,
  })
  requireFreezable(input.frozen, subject, start, violations)
  if (input.work === 'shorten' && violations.length > 0)
    refuse(
      'embedding.start-broken',
      `E-${row.number} does not hold for ${subject.problem.name} at calibration ${subject.machine.calibration.number}: ${violations[0]!.message} Repair it first.`,
      [{ path: 'start.work', message: 'only an embedding that holds can be shortened' }],
    )
  return start
}

function requireChains(row: EmbeddingRow, { machine }: Subject): void {
  if (row.machineId !== machine.machine.id)
    refuse(
      'embedding.start-machine',
      `E-${row.number} is on another machine than ${machine.machine.name}: its qubits have no meaning there.`,
      [{ path: 'start.embeddingId', message: 'begin from an embedding on the same machine' }],
    )
  if (row.status !== 'found' || !row.chainsBlobId)
    throw new DomainError(
      'wrong state',
      'embedding.start-state',
      `E-${row.number} is ${row.status}; it has no chains to begin from.`,
    )
}

/** Chains can only stay where there are any, and something has to be left to change. */
function requireKnown(frozen: readonly string[], { labels, problem }: Subject, { chains, frozen: mask }: Start): void {
  const places = new Map(labels.map((label, i) => [label, i]))
  const issues = frozen.flatMap((label, k): Issue[] => {
    const place = places.get(label)
    const path = `start.frozen.${k}`
    if (place === undefined) return [{ path, message: `${problem.name} has no variable ${label}` }]
    return chainOf(chains, place).length === 0
      ? [{ path, message: `${label} is new: the embedding to begin from has no chain for it` }]
      : []
  })
  if (issues.length > 0)
    refuse('embedding.frozen', `These chains cannot stay as they are; the first: ${issues[0]!.message}.`, issues)
  if (mask.every((stays) => stays === 1))
    refuse('embedding.frozen-all', 'All chains are to stay as they are: nothing is left to change.', [
      { path: 'start.frozen', message: 'leave at least one variable out' },
    ])
}

/** What is broken among the chains that must stay can never be mended. */
function requireFreezable(
  frozen: readonly string[],
  { labels, machine }: Subject,
  { frozen: mask }: Start,
  violations: readonly Violation[],
): void {
  const broken = violations.filter(({ variables }) => variables.every((v) => mask[v] === 1))
  if (broken.length === 0) return
  refuse(
    'embedding.frozen-broken',
    `Some chains that are to stay do not hold at calibration ${machine.calibration.number}; the first: ${broken[0]!.message}`,
    broken.map(({ variables, message }) => ({
      path: `start.frozen.${frozen.indexOf(labels[variables[0]!]!)}`,
      message,
    })),
  )
}
