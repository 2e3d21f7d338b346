import { aliasedTable, and, eq, sql } from 'drizzle-orm'
import type { Db } from '../../client'
import {
  brokenEmbeddings,
  calibrations,
  embeddings,
  machines,
  problems,
  problemVersions,
  reductions,
  referenceOptima,
} from '../../schema'
import { isDeleted, told } from './told'

const start = aliasedTable(embeddings, 'start')

const uploaded = (db: Db, problemId: string) =>
  db
    .select(
      told({
        id: sql`${problems.id} || ' ' || ${problemVersions.version}`,
        source: 'version',
        kind: 'problem',
        at: problemVersions.versionAt,
        by: problemVersions.versionBy,
        thingId: problems.id,
        label: sql`'P-' || ${problems.number}`,
        facts: sql`jsonb_build_object('version', ${problemVersions.version}, 'remark', ${problemVersions.remark},
          'isRelabelled', ${problemVersions.source} ? 'relabelled',
          'isMade', ${problemVersions.source} ? 'copyOf' or ${isDeleted(reductions.problemId)})`,
      }),
    )
    .from(problemVersions)
    .innerJoin(problems, eq(problems.id, problemVersions.problemId))
    .leftJoin(reductions, eq(reductions.problemId, problems.id))
    .where(eq(problems.id, problemId))

const optimised = (db: Db, problemId: string) =>
  db
    .select(
      told({
        id: referenceOptima.id,
        source: 'optimum',
        kind: 'problem',
        at: referenceOptima.createdAt,
        by: referenceOptima.createdBy,
        thingId: problems.id,
        label: sql`'P-' || ${problems.number}`,
        facts: sql`jsonb_build_object('status', ${referenceOptima.status}, 'energy', ${referenceOptima.energy},
          'isProved', ${referenceOptima.proved}, 'isMax', ${problemVersions.sense} = 'max',
          'reason', ${referenceOptima.reason})`,
      }),
    )
    .from(referenceOptima)
    .innerJoin(problems, eq(problems.id, referenceOptima.problemId))
    .innerJoin(
      problemVersions,
      and(eq(problemVersions.problemId, problems.id), eq(problemVersions.version, referenceOptima.problemVersion)),
    )
    .where(eq(problems.id, problemId))

const embedded = (db: Db, problemId: string) =>
  db
    .select(
      told({
        id: embeddings.id,
        source: 'embedding',
        kind: 'embedding',
        at: embeddings.createdAt,
        by: embeddings.createdBy,
        thingId: embeddings.id,
        label: sql`'E-' || ${embeddings.number}`,
        isGone: isDeleted(embeddings.deletedWith),
        facts: sql`jsonb_build_object('machine', ${machines.name}, 'status', ${embeddings.status},
          'isImported', ${embeddings.method} = 'imported',
          'inPlaceOf', case when ${embeddings.replaces} then 'E-' || ${start.number} end,
          'longest', ${embeddings.stats} #> '{chainLength,max}', 'qubits', ${embeddings.stats} -> 'qubitsUsed')`,
      }),
    )
    .from(embeddings)
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .leftJoin(start, eq(start.id, embeddings.startId))
    .where(eq(embeddings.problemId, problemId))

const broken = (db: Db, problemId: string) =>
  db
    .select(
      told({
        id: sql`${embeddings.id} || ' ' || ${calibrations.number}`,
        source: 'broken',
        kind: 'embedding',
        at: calibrations.createdAt,
        by: calibrations.createdBy,
        thingId: embeddings.id,
        label: sql`'E-' || ${embeddings.number}`,
        isGone: isDeleted(embeddings.deletedWith),
        facts: sql`jsonb_build_object('machine', ${machines.name}, 'calibration', ${calibrations.number},
          'chains', ${brokenEmbeddings.damage} -> 'chains', 'ofChains', ${brokenEmbeddings.damage} -> 'ofChains')`,
      }),
    )
    .from(brokenEmbeddings)
    .innerJoin(embeddings, eq(embeddings.id, brokenEmbeddings.embeddingId))
    .innerJoin(machines, eq(machines.id, brokenEmbeddings.machineId))
    .innerJoin(
      calibrations,
      and(
        eq(calibrations.machineId, brokenEmbeddings.machineId),
        eq(calibrations.number, brokenEmbeddings.calibration),
      ),
    )
    .where(eq(embeddings.problemId, problemId))

/** Versions, looks for the optimum, embeddings, and calibrations that break these. */
export const problemRecords = (db: Db, problemId: string) => [
  uploaded(db, problemId),
  optimised(db, problemId),
  embedded(db, problemId),
  broken(db, problemId),
]
