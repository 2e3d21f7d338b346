import { aliasedTable, and, eq, isNotNull, or, sql } from 'drizzle-orm'
import type { Db } from '../../client'
import { answerSheets, embeddings, returns, runSheetRemarks, runSheets, scans } from '../../schema'
import type { ActivityScope } from './told'
import { isDeleted, samplesLabel, sheetLabel, sheetsIn, told } from './told'

const from = aliasedTable(runSheets, 'from_sheet')

/** Run sheets that were prepared; of one run sheet, those made from it too. */
const prepared = (db: Db, scope: ActivityScope) =>
  db
    .select(
      told({
        id: runSheets.id,
        source: 'run sheet',
        kind: 'run sheet',
        at: runSheets.createdAt,
        by: runSheets.preparedBy,
        thingId: runSheets.id,
        label: sheetLabel,
        isGone: isDeleted(runSheets.deletedWith),
        facts: sql`jsonb_build_object('name', ${runSheets.name}, 'from', 'RS-' || ${from.number})`,
      }),
    )
    .from(runSheets)
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .leftJoin(from, eq(from.id, runSheets.madeFromId))
    .where('runSheetId' in scope ? or(sheetsIn(scope), eq(runSheets.madeFromId, scope.runSheetId)) : sheetsIn(scope))

const handedOver = (db: Db, scope: ActivityScope) =>
  db
    .select(
      told({
        id: runSheetRemarks.id,
        source: 'remark',
        kind: 'run sheet',
        at: runSheetRemarks.createdAt,
        by: runSheetRemarks.by,
        thingId: runSheets.id,
        label: sheetLabel,
        isGone: isDeleted(runSheets.deletedWith),
        forUserId: runSheetRemarks.forUserId,
        facts: sql`jsonb_build_object('what', ${runSheetRemarks.what})`,
      }),
    )
    .from(runSheetRemarks)
    .innerJoin(runSheets, eq(runSheets.id, runSheetRemarks.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .where(sheetsIn(scope))

const sampled = (db: Db, scope: ActivityScope) =>
  db
    .select(
      told({
        id: returns.id,
        source: 'samples',
        kind: 'samples',
        at: returns.createdAt,
        by: returns.createdBy,
        thingId: returns.id,
        label: samplesLabel,
        isGone: isDeleted(returns.deletedWith),
        facts: sql`jsonb_build_object('source', ${returns.source}, 'status', ${returns.status},
          'byBridge', ${returns.made} @> '{"byBridge": true}', 'reads', ${returns.reads},
          'broken', ${returns.readsWithBreak})`,
      }),
    )
    .from(returns)
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .where(sheetsIn(scope))

const scanned = (db: Db, scope: ActivityScope) =>
  db
    .select(
      told({
        id: scans.id,
        source: 'scan',
        kind: 'run sheet',
        at: scans.createdAt,
        by: scans.createdBy,
        thingId: runSheets.id,
        label: sheetLabel,
        isGone: isDeleted(runSheets.deletedWith),
        facts: sql`jsonb_build_object('number', ${scans.number}, 'strengths', jsonb_array_length(${scans.points}))`,
      }),
    )
    .from(scans)
    .innerJoin(runSheets, eq(runSheets.id, scans.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .where(sheetsIn(scope))

const answered = (db: Db, scope: ActivityScope, isRevoked: boolean) =>
  db
    .select(
      told({
        id: sql`${answerSheets.id} || ${isRevoked ? ' revoked' : ''}`,
        source: 'answer',
        kind: 'samples',
        at: isRevoked ? answerSheets.revokedAt : answerSheets.createdAt,
        by: isRevoked ? answerSheets.revokedBy : answerSheets.createdBy,
        thingId: returns.id,
        label: samplesLabel,
        isGone: isDeleted(returns.deletedWith),
        facts: sql`jsonb_build_object('isRevoked', ${isRevoked}::boolean)`,
      }),
    )
    .from(answerSheets)
    .innerJoin(returns, eq(returns.id, answerSheets.returnId))
    .innerJoin(runSheets, eq(runSheets.id, returns.runSheetId))
    .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
    .where(and(sheetsIn(scope), isRevoked ? isNotNull(answerSheets.revokedAt) : undefined))

/** What run sheets, their remarks, samples, scans and answer sheets tell. */
export const runSheetRecords = (db: Db, scope: ActivityScope) => [
  prepared(db, scope),
  handedOver(db, scope),
  sampled(db, scope),
  scanned(db, scope),
  answered(db, scope, false),
  answered(db, scope, true),
]
