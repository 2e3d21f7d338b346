import { afterAll, beforeAll, expect, it } from 'vitest'
import type { Database } from '../../server/database/client'
import { migrate, openDatabase } from '../../server/database/client'
import { MIGRATIONS } from '../../server/database/migrations'
import { temporaryFolder } from '../support/server'

let database: Database
beforeAll(async () => {
  database = await openDatabase({ dataFolder: temporaryFolder() })
})
afterAll(() => database.close())

/** What a database of the first release holds: a problem, a machine and three embeddings. */
const FIRST_RELEASE = `
  insert into workspaces values ('w', 'Workspace', now());
  insert into users values ('u', 'u@test.example', 'User', '-', now());
  insert into blobs values ('b', 0, true, now());
  insert into problems values ('p', 'w', 1, 'Problem', '', 'qubo', 'min', 2, 1, 'b', '-', '{}', '{}', '{}', 'u', now(), now());
  insert into machines values ('m', 'w', 'Machine', '', '{}', 1, 'u', now(), now());
  insert into embeddings (id, workspace_id, problem_id, machine_id, calibration, number, status, method, seed, tries,
    time_limit_seconds, unmet, version, created_by, created_at) values
    ('found', 'w', 'p', 'm', 1, 1, 'found', 'search', 1, 8, 30, null, '0.1.0', 'u', now()),
    ('imported', 'w', 'p', 'm', 1, 2, 'found', 'imported', 0, 0, 0, null, '0.1.0', 'u', now()),
    ('none', 'w', 'p', 'm', 1, 3, 'none found', 'search', 1, 8, 30, '{"message":"None.","overlap":2}', '0.1.0', 'u', now());
`

it('bring a database of the first release up to date without losing anything', async () => {
  await migrate(database, MIGRATIONS.slice(0, 1))
  await database.executeSql(FIRST_RELEASE)
  await migrate(database)
  const { rows } = await database.executeSql(
    'select id, method, method_used, objective, target, frozen, chosen, start_id, unmet from embeddings order by number',
  )
  const target = { longestChain: null, totalQubits: null }
  const defaults = { objective: 'longest chain', target, frozen: [], chosen: false, start_id: null }
  expect(rows).toEqual([
    { id: 'found', method: 'search', method_used: 'search', unmet: null, ...defaults },
    { id: 'imported', method: 'imported', method_used: 'imported', unmet: null, ...defaults },
    {
      id: 'none',
      method: 'search',
      method_used: null,
      unmet: { message: 'None.', overlap: 2, proved: false, neededQubits: null, advice: [] },
      ...defaults,
    },
  ])
})

it('move the data of a problem to its first version', async () => {
  const { rows } = await database.executeSql(
    'select p.name, p.current_version, p.tags, v.* from problems p join problem_versions v on v.problem_id = p.id',
  )
  expect(rows).toMatchObject([
    {
      name: 'Problem',
      current_version: 1,
      tags: [],
      version: 1,
      form: 'qubo',
      sense: 'min',
      variables: 2,
      interactions: 1,
      data_blob_id: 'b',
      groups: null,
      version_by: 'u',
    },
  ])
})

it('are applied once', async () => {
  await migrate(database)
  const { rows } = await database.executeSql('select count(*)::int as n from embeddings')
  expect(rows).toEqual([{ n: 3 }])
})
