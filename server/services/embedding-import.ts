import { randomUUID } from 'node:crypto'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { packChains } from '../../shared/engine/embedding/embedding'
import { embeddingStats } from '../../shared/engine/embedding/stats'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import { DomainError } from '../../shared/errors'
import type { ImportEmbedding } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertEmbedding } from '../database/repositories/embeddings'
import { changedChains, packEmbedding } from './chains'
import { storeVerdict } from './broken-embeddings'
import { damageOfChains } from './embedding-damage'
import { storedStats } from './embedding-stats'
import type { Subject } from './embedding-subject'
import { carriedChains, embeddingRow, identityOf, subjectOf } from './embedding-subject'
import { untilSaved } from './overtaken'

/** Saves chains given by hand, by variable label, after the checker has passed them. */
export async function importEmbedding(app: App, actor: Actor, input: ImportEmbedding): Promise<{ id: string }> {
  const subject = await subjectOf(app, actor, input)
  const before = input.editedFrom ? await editedChains(app, actor, subject, input.editedFrom) : null
  const embedding = verifiedChains(subject, input.chains)
  const { bytes, fingerprint } = packEmbedding(embedding)
  const chainsBlobId = await app.blobs.write(bytes)
  const method: 'edited' | 'imported' = before ? 'edited' : 'imported'
  const row = {
    id: randomUUID(),
    ...identityOf(app, actor, subject),
    status: 'found' as const,
    method,
    methodUsed: method,
    startId: input.editedFrom,
    changedChains: before && changedChains(before, embedding),
    seed: 0,
    tries: 0,
    timeLimitSeconds: 0,
    seconds: 0,
    chainsBlobId,
    fingerprint,
    stats: storedStats(embeddingStats(embedding, subject.graph, subject.machine.graph)),
  }
  await untilSaved(
    () => damageOfChains(app, embedding, subject.graph, subject.machine),
    ({ inForce, damage }) =>
      app.db.transaction(async (tx) => {
        await app.blobs.adopt(tx, chainsBlobId)
        const number = await nextNumber(tx, subject.problem.id, 'embedding')
        const saved = await insertEmbedding(tx, { ...row, number })
        const made = { embedding: saved, problem: subject.problem.name }
        await storeVerdict(app, tx, made, { machine: inForce.machine, damage })
      }),
  )
  return { id: row.id }
}

/** @throws DomainError naming each broken rule */
function verifiedChains(subject: Subject, named: ImportEmbedding['chains']): Embedding {
  const { labels, graph, machine } = subject
  const known = new Set(labels)
  const unknown = Object.keys(named).filter((label) => !known.has(label))
  const issues = unknown.map((label) => ({ path: `chains.${label}`, message: `The problem has no variable ${label}.` }))
  const { fabric, indexOf } = machine
  const outside = fabric.graph.order
  const chains = labels.map((label) => (Object.hasOwn(named, label) ? named[label]! : []))
  // A number that the family lacks becomes an index outside the machine, which the checker names as unknown.
  const dense = chains.map((chain) => chain.map((number) => (indexOf(number) < 0 ? outside + number : indexOf(number))))
  const violations = verifyEmbedding(graph, machine.graph, machine.usable, dense, {
    label: (i) => labels[i]!,
    qubitName: (q) => String(q < outside ? fabric.ids[q] : q - outside),
  })
  issues.push(
    ...violations.map(({ variables, message }) => ({ path: `chains.${labels[variables[0] ?? 0] ?? ''}`, message })),
  )
  if (issues.length > 0)
    throw new DomainError(
      'not acceptable',
      'embedding.invalid',
      issues.length === 1
        ? issues[0]!.message
        : `These chains break ${issues.length} rules; the first: ${issues[0]!.message}`,
      issues.slice(0, 200),
    )
  return packChains(dense)
}

/** The chains as they were before they were edited. */
async function editedChains(app: App, actor: Actor, subject: Subject, id: string): Promise<Embedding> {
  const row = await embeddingRow(app, actor, id)
  const refuse = (message: string) => {
    throw new DomainError('not acceptable', 'embedding.edited-from', message, [{ path: 'editedFrom', message }])
  }
  if (row.problemId !== subject.problem.id) refuse(`E-${row.number} is not of ${subject.problem.name}.`)
  if (row.machineId !== subject.machine.machine.id) refuse(`E-${row.number} is not on ${subject.machine.machine.name}.`)
  if (row.status !== 'found') refuse(`E-${row.number} is ${row.status}; it has no chains to edit.`)
  return carriedChains(app, subject, row)
}
