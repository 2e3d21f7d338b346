import { getTableName, is } from 'drizzle-orm'
import { PgTable } from 'drizzle-orm/pg-core'
import { expect, it } from 'vitest'
import {
  NOT_ARCHIVED,
  referencesOf,
  WORK_TABLE_NAMES,
  WORK_TABLES,
} from '../../../../server/database/repositories/workspace-rows'
import * as schema from '../../../../server/database/schema'

it('decides of every table whether an archive of a workspace holds it', () => {
  const all = Object.values(schema).flatMap((one) => (is(one, PgTable) ? [getTableName(one)] : []))
  const archived = Object.values(WORK_TABLES).map(getTableName)
  expect([...archived, ...NOT_ARCHIVED].sort()).toEqual(all.sort())
})

it('has every table after those that its rows refer to', () => {
  for (const [place, name] of WORK_TABLE_NAMES.entries())
    for (const { to } of referencesOf(name)) {
      const before = WORK_TABLE_NAMES.findIndex((other) => other === to)
      expect(before).toBeLessThanOrEqual(place)
    }
})
