import { randomUUID } from 'node:crypto'
import { packChains } from '../../shared/engine/embedding/embedding'
import { embeddingStats } from '../../shared/engine/embedding/stats'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import { DomainError } from '../../shared/errors'
import type { ImportEmbedding } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertEmbedding } from '../database/repositories/embeddings'
import { packEmbedding } from './chains'
import { storedStats } from './embedding-stats'
import { identityOf, subjectOf } from './embedding-subject'

/** Saves chains given by hand, by variable label, after the checker has passed them. */
export async function importEmbedding(app: App, actor: Actor, input: ImportEmbedding): Promise<{ id: string }> {
  const subject = await subjectOf(app, actor, input)
  const { labels, graph, machine } = subject
  const known = new Set(labels)
  const unknown = Object.keys(input.chains).filter((label) => !known.has(label))
  const issues = unknown.map((label) => ({ path: `chains.${label}`, message: `The problem has no variable ${label}.` }))
  const { fabric, indexOf } = machine
  const outside = fabric.graph.order
  const chains = labels.map((label) => (Object.hasOwn(input.chains, label) ? input.chains[label]! : []))
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
      `These chains break ${issues.length} rules; the first: ${issues[0]!.message}`,
      issues.slice(0, 200),
    )
  const embedding = packChains(dense)
  const { bytes, fingerprint } = packEmbedding(embedding)
  const chainsBlobId = await app.blobs.write(bytes)
  const id = randomUUID()
  await app.db.transaction(async (tx) => {
    await app.blobs.adopt(tx, chainsBlobId)
    await insertEmbedding(tx, {
      id,
      ...identityOf(app, actor, subject),
      number: await nextNumber(tx, subject.problem.id, 'embedding'),
      status: 'found',
      method: 'imported',
      methodUsed: 'imported',
      seed: 0,
      tries: 0,
      timeLimitSeconds: 0,
      seconds: 0,
      chainsBlobId,
      fingerprint,
      stats: storedStats(embeddingStats(embedding, graph, machine.graph)),
    })
  })
  return { id }
}
