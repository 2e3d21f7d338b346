import type { VariableGroup } from '../../shared/engine/problem/groups/group'
import type { Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'
import type { GroupsView, GroupView, SaveGroups } from '../../shared/schemas/groups'
import { GROUP_LIMITS } from '../../shared/schemas/groups'
import type { ConstraintGroup } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { saveGroups } from '../database/repositories/groups'
import type { RecogniseGroupsOutput } from '../workers/tasks/recognise-groups'
import type { ProblemData } from './problem-data'
import { problemData, problemRow } from './problems'
import { Recent } from './recent'

/** By fingerprint; what is being worked out is waited for by all who ask for it. */
const recognitions = new Recent<Promise<RecogniseGroupsOutput>>(32)

async function recognised(app: App, fingerprint: string, data: ProblemData): Promise<RecogniseGroupsOutput> {
  const { problem, form } = data
  const found = recognitions.get(fingerprint, () => app.compute.run('recogniseGroups', { problem, form, groups: null }))
  try {
    return await found
  } catch (error) {
    recognitions.drop(fingerprint, found)
    throw error
  }
}

/** What all labels of a group begin with, without separators at its end; else its number. */
function nameOf(labels: readonly string[], number: number, taken: Set<string>): string {
  const [first] = labels
  let length = first!.length
  for (const label of labels) while (!label.startsWith(first!.slice(0, length))) length--
  const common = first!.slice(0, length).replace(/[^\p{L}\p{N}]+$/u, '')
  const name = common.length < 2 || taken.has(common) ? `Group ${number}` : common
  taken.add(name)
  return name
}

type Named = Omit<ConstraintGroup, 'members'> & Pick<VariableGroup, 'members'>

const viewsOf = (
  groups: readonly Named[],
  penalties: RecogniseGroupsOutput['penalties'],
  labels: string[],
): GroupView[] =>
  groups.map(({ name, kind, k, source, members }, g) => ({
    name,
    kind,
    k,
    source,
    members: members.map((i) => labels[i]!),
    penalty: penalties && penalties[g]!,
  }))

/** The groups of a problem: those recognised in its coefficients, and those that were confirmed or entered. */
export async function groupsOf(app: App, actor: Actor, id: string, version?: number): Promise<GroupsView> {
  const row = await problemRow(app, actor, id, version)
  const data = await problemData(app, row)
  const { labels, form, problem } = data
  const found = await recognised(app, row.fingerprint, data)
  const taken = new Set<string>()
  const named = found.groups.map((group, g) => ({
    ...group,
    name: nameOf(
      group.members.map((i) => labels[i]!),
      g + 1,
      taken,
    ),
    source: 'recognised' as const,
  }))
  const confirmed = row.groups && (await app.compute.run('recogniseGroups', { problem, form, groups: row.groups }))
  return {
    problemVersion: row.version,
    variables: row.variables,
    recognised: viewsOf(named, found.penalties, labels),
    complete: found.complete,
    confirmed: confirmed && viewsOf(row.groups!, confirmed.penalties, labels),
    fingerprint: row.fingerprint,
    seconds: found.seconds,
    version: app.version,
  }
}

/** What is wrong with a group on its own, in words. */
function faultsOf({ kind, k, members }: SaveGroups['groups'][number], path: string): Issue[] {
  const size = members.length
  if (k > size) return [{ path: `${path}.k`, message: `${k} of ${size} members cannot be 1` }]
  if ((kind === 'at most' && k === size) || (kind === 'at least' && k === 0))
    return [{ path: `${path}.k`, message: `${kind} ${k} of ${size} always holds` }]
  return []
}

/** Labels to indices. @throws DomainError naming each label and group that cannot be taken */
function resolved(groups: SaveGroups['groups'], labels: readonly string[]): ConstraintGroup[] {
  const indices = new Map(labels.map((label, i) => [label, i]))
  const names = new Set<string>()
  const issues: Issue[] = []
  const result = groups.map((group, g) => {
    const path = `groups.${g}`
    if (names.has(group.name)) issues.push({ path: `${path}.name`, message: `two groups are called ${group.name}` })
    names.add(group.name)
    issues.push(...faultsOf(group, path))
    const members = new Set<number>()
    group.members.forEach((label, m) => {
      const index = indices.get(label)
      const at = `${path}.members.${m}`
      if (index === undefined)
        issues.push({ path: at, message: `${group.name}: there is no variable called “${label}”` })
      else if (members.has(index)) issues.push({ path: at, message: `${group.name}: “${label}” stands twice` })
      else members.add(index)
    })
    return { ...group, members: [...members].sort((a, b) => a - b) }
  })
  if (issues.length > 0)
    throw new DomainError(
      'not acceptable',
      'groups.refused',
      `Nothing was saved. ${issues[0]!.message}${issues.length > 1 ? `, and ${issues.length - 1} more` : ''}.`,
      issues.slice(0, 100),
    )
  return result
}

/** Saves the groups of a problem's current version, all of them at once. */
export async function putGroups(app: App, actor: Actor, id: string, request: SaveGroups): Promise<{ groups: number }> {
  const inAll = request.groups.reduce((sum, { members }) => sum + members.length, 0)
  if (inAll > GROUP_LIMITS.membersInAll)
    throw new DomainError(
      'too large',
      'groups.members',
      `Groups have at most ${GROUP_LIMITS.membersInAll} members in all, not ${inAll}.`,
    )
  const row = await problemRow(app, actor, id)
  const seen = request.version ?? row.version
  const { labels } = await problemData(app, row)
  const groups = seen === row.version ? resolved(request.groups, labels) : []
  const isSaved =
    seen === row.version && (await app.db.transaction((tx) => saveGroups(tx, id, seen, groups, app.now())))
  if (!isSaved)
    throw new DomainError(
      'wrong state',
      'groups.version',
      `These groups belong to version ${seen}, which is not the current one. Reload the page and look at them again.`,
    )
  return { groups: groups.length }
}
