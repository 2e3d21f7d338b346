import { afterAll, beforeAll, expect, it } from 'vitest'
import { groupsOf, putGroups } from '../../server/services/problem-groups'
import { saveGroupsSchema } from '../../shared/schemas/groups'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

/** Four berths, of which each of three ferries takes one: 10 (Σ x − 1)², and a cost of each. */
function berths(): string {
  const lines: string[] = []
  for (const ferry of ['Heron', 'Gannet', 'Tern']) {
    const labels = [1, 2, 3, 4].map((berth) => `${ferry}-${berth}`)
    labels.forEach((label, i) => {
      lines.push(`${label} ${label} ${i + 1 - 10}`)
      for (const other of labels.slice(i + 1)) lines.push(`${label} ${other} 20`)
    })
  }
  return lines.join('\n')
}

const save = (id: string, groups: unknown[], version?: number) =>
  putGroups(test.app, test.actor, id, saveGroupsSchema.parse({ groups, version }))

it('are recognised with their penalties, named by what their labels share, and nobody has looked at them', async () => {
  const id = await test.problem(berths())
  const { recognised, confirmed, complete } = await groupsOf(test.app, test.actor, id)
  expect(complete).toBe(true)
  expect(confirmed).toBeNull()
  expect(recognised.map(({ name, kind, k, source }) => ({ name, kind, k, source }))).toEqual(
    ['Heron', 'Gannet', 'Tern'].map((name) => ({ name, kind: 'exactly', k: 1, source: 'recognised' })),
  )
  expect(recognised[0]!.members).toEqual(['Heron-1', 'Heron-2', 'Heron-3', 'Heron-4'])
  // Switching on costs at least 1, switching off gains nothing.
  expect(recognised[0]!.penalty).toMatchObject({ weight: 10, sufficient: 1, verdict: 'larger than needed' })
})

it('are saved all at once, by label, and read back with their penalties', async () => {
  const id = await test.problem(berths())
  const groups = [
    { name: 'First berths', kind: 'at most', k: 2, members: ['Tern-1', 'Heron-1', 'Gannet-1'] },
    {
      name: 'Heron',
      kind: 'exactly',
      k: 1,
      members: ['Heron-1', 'Heron-2', 'Heron-3', 'Heron-4'],
      source: 'recognised',
    },
  ]
  expect(await save(id, groups)).toEqual({ groups: 2 })
  const { confirmed } = await groupsOf(test.app, test.actor, id)
  expect(confirmed).toMatchObject([
    { ...groups[0], members: ['Heron-1', 'Gannet-1', 'Tern-1'], source: 'entered', penalty: { weight: null } },
    { ...groups[1], penalty: { weight: 10, overlaps: 1 } },
  ])
  expect(await save(id, [])).toEqual({ groups: 0 })
  expect((await groupsOf(test.app, test.actor, id)).confirmed).toEqual([])
})

it('are refused with each label and number that does not fit, and nothing is saved', async () => {
  const id = await test.problem(berths())
  const one = { name: 'A', kind: 'exactly', k: 1, members: ['Heron-1', 'Heron-2'] }
  const refused = async (groups: unknown[], ...paths: string[]) => {
    const issues = paths.map((path) => expect.objectContaining({ path }))
    await expect(save(id, groups)).rejects.toMatchObject({ kind: 'not acceptable', issues })
  }
  await refused(
    [one, { ...one, name: 'B', members: ['Heron-1', 'Raven', 'Heron-1'] }],
    'groups.1.members.1',
    'groups.1.members.2',
  )
  await refused([one, one], 'groups.1.name')
  await refused([{ ...one, k: 3 }], 'groups.0.k')
  await refused([{ ...one, kind: 'at least', k: 0 }], 'groups.0.k')
  await refused([{ ...one, kind: 'at most', k: 2 }], 'groups.0.k')
  await expect(save(id, [one], 7)).rejects.toMatchObject({ kind: 'wrong state', code: 'groups.version' })
  for (const bad of [
    { ...one, members: ['Heron-1'] },
    { ...one, kind: 'about' },
    { ...one, k: 0.5 },
    { ...one, weight: 3 },
  ])
    expect(saveGroupsSchema.safeParse({ groups: [bad] }).success).toBe(false)
  expect((await groupsOf(test.app, test.actor, id)).confirmed).toBeNull()
})

it('belong to a workspace', async () => {
  const id = await test.problem(berths())
  const stranger = { ...test.actor, workspaceId: test.actor.userId }
  await expect(groupsOf(test.app, stranger, id)).rejects.toMatchObject({ kind: 'not found' })
  await expect(putGroups(test.app, stranger, id, { groups: [] })).rejects.toMatchObject({ kind: 'not found' })
})
