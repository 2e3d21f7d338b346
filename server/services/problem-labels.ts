import { clashKey, labelFault } from '../../shared/engine/formats/labels'
import type { Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'
import type { RenameVariables } from '../../shared/schemas/problem-versions'
import type { Actor, App } from '../app'
import { addVersion } from './problem-versions'
import { problemData, problemRow } from './problems'

type Rename = RenameVariables['renames'][number]

/** Renames told one by one in the remark of the version. */
const TOLD = 3

/** `renamed a to b, c to d and 2 more`. */
export function renameRemark(renames: readonly Rename[]): string {
  const told = renames.slice(0, TOLD).map(({ from, to }) => `${from} to ${to}`)
  const more = renames.length > TOLD ? ` and ${renames.length - TOLD} more` : ''
  return `renamed ${told.join(', ')}${more}`
}

/**
 * The labels after renaming. A label that another variable bears is refused even if that one is renamed too: what was
 * built on the earlier version is carried over by label.
 * @throws DomainError naming each rename that cannot be made
 */
export function renamedLabels(labels: readonly string[], renames: readonly Rename[]): string[] {
  const places = new Map(labels.map((label, i) => [label, i]))
  const bearers = new Map(labels.map((label) => [clashKey(label), label]))
  const given = new Map<string, string>()
  const changed = [...labels]
  const issues: Issue[] = []
  renames.forEach(({ from, to: typed }, k) => {
    const to = typed.trim()
    const wrong = (part: 'from' | 'to', message: string) => issues.push({ path: `renames.${k}.${part}`, message })
    const place = places.get(from)
    if (from === '') return wrong('from', 'name the variable')
    if (place === undefined) return wrong('from', `the problem has no variable “${from}”`)
    if (changed[place] !== from) return wrong('from', `“${from}” is renamed twice`)
    const fault = labelFault(to)
    if (fault) return wrong('to', `“${from}” cannot be renamed: ${fault}`)
    if (to === from) return wrong('to', `“${from}” has this label already`)
    const bearer = bearers.get(clashKey(to))
    if (bearer === to) return wrong('to', `“${to}” is the label of another variable: give each variable one label`)
    if (bearer !== undefined && bearer !== from)
      return wrong('to', `“${to}” is too like “${bearer}”, the label of another variable: give each one label`)
    const other = given.get(clashKey(to))
    if (other !== undefined) return wrong('to', `“${other}” and “${from}” cannot both be called “${to}”`)
    given.set(clashKey(to), from)
    changed[place] = to
  })
  if (issues.length > 0)
    throw new DomainError('not acceptable', 'problem.labels', `Nothing was renamed: ${issues[0]!.message}.`, issues)
  return changed
}

/** Gives variables of the current version other labels, which makes a new version; confirmed groups come with it. */
export async function renameVariables(
  app: App,
  actor: Actor,
  id: string,
  { version, renames }: RenameVariables,
): Promise<{ version: number }> {
  const row = await problemRow(app, actor, id)
  const data = await problemData(app, row)
  const labels = renamedLabels(data.labels, renames)
  const { form, sense, variables, interactions, reading, structure, groups } = row
  const { change: _change, copyOf: _copyOf, ...source } = row.source
  const draft = {
    remark: renameRemark(renames),
    form,
    sense,
    variables,
    interactions,
    source: { ...source, relabelled: row.version },
    reading,
    structure,
    groups,
  }
  const saved = await addVersion(app, actor, id, { ...data, labels }, draft, version ?? row.version)
  return { version: saved.version }
}
