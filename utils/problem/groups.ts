import { csvCell } from '#shared/csv'
import type { GroupsView, GroupView, PenaltyView, SaveGroups } from '#shared/schemas/groups'
import { formatCount, formatNumber } from '../format'
import type { HelpCase } from '../help/registry'
import type { MarkKind } from '../ui/parts'

/** A group on the page: as saved, or as it is being changed. */
export type DraftGroup = Omit<GroupView, 'penalty'> & { penalty?: PenaltyView | null }

/** `exactly 1 of 6`. */
export const demandWords = ({ kind, k }: Pick<GroupView, 'kind' | 'k'>, members: number): string =>
  `${kind} ${formatNumber(k)} of ${formatNumber(members)}`

type Verdict = NonNullable<PenaltyView['verdict']>

const VERDICTS: Record<Verdict, { mark: MarkKind; word: string }> = {
  'strong enough': { mark: 'passed', word: 'strong enough' },
  'larger than needed': { mark: 'computed', word: 'larger than needed' },
  'beats single changes': { mark: 'computed', word: 'beats single changes, not proved' },
  'may be too weak': { mark: 'caution', word: 'may be too weak' },
}

/** What is to be said of a penalty; null where there is none to judge. */
export function verdictOf(penalty: PenaltyView | null | undefined): { mark: MarkKind; word: string } | null {
  if (!penalty?.verdict) return null
  const { verdict, weight, sufficient } = penalty
  const words = VERDICTS[verdict]
  // A bound of nought, or hardly more, would give a factor that says nothing.
  if (verdict !== 'larger than needed' || !sufficient) return words
  return { ...words, word: `${words.word}, ${formatNumber(weight! / sufficient, { significant: 2 })}×` }
}

/** `all 15 pairs`, or how many of them differ, and by how much. */
export function pairsWords({ pairs, pairsDeviating, greatestDeviation }: PenaltyView): string {
  if (pairsDeviating === 0) return ''
  return `${formatNumber(pairsDeviating)} of ${formatCount(pairs, 'pair')} differ, by up to ${formatNumber(greatestDeviation, { significant: 3 })}`
}

const SHOWN = 6

/** The first members, and how many more. */
export function memberWords(members: readonly string[], most = SHOWN): string {
  const more = members.length - most
  return more > 0 ? `${members.slice(0, most).join(', ')} and ${formatNumber(more)} more` : members.join(', ')
}

type Penalised = readonly DraftGroup[]

const casesOf = (groups: Penalised, make: (penalty: PenaltyView, group: DraftGroup) => HelpCase['help'] | null) =>
  groups.flatMap((group) => {
    const help = group.penalty && group.penalty.weight !== null ? make(group.penalty, group) : null
    return help ? [{ label: group.name, help }] : []
  })

/** The computed columns of a table of groups, explained group by group. */
export function groupColumns(groups: Penalised) {
  return [
    {
      label: 'Weight P',
      name: 'the weight of a penalty',
      cases: () =>
        casesOf(groups, ({ weight, pairs, pairsDeviating: deviating, greatestDeviation: greatest }) => ({
          id: 'penaltyWeight',
          given: { coupling: 2 * weight!, pairs, deviating, greatest },
        })),
    },
    {
      label: 'Single change',
      name: 'the weight that outweighs a single change',
      cases: () =>
        casesOf(groups, ({ weight, single, overlaps }) => ({
          id: 'penaltySingle',
          given: { weight: weight!, needed: single!, overlaps },
        })),
    },
    {
      label: 'Enough above',
      name: 'the weight above which a penalty is enough',
      cases: () =>
        casesOf(groups, ({ weight, sufficient, overlaps }) => ({
          id: 'penaltyEnough',
          given: { weight: weight!, needed: sufficient!, overlaps },
        })),
    },
  ] as const
}

const keyOf = ({ kind, k, members }: DraftGroup): string => JSON.stringify([kind, k, [...members].sort()])

/** Recognised groups that are not among these. */
export function notAmong(groups: readonly DraftGroup[], recognised: readonly GroupView[]): GroupView[] {
  const known = new Set(groups.map(keyOf))
  return recognised.filter((group) => !known.has(keyOf(group)))
}

/** The recognised groups under names that none of the others bears. */
export function withFreshNames(groups: readonly DraftGroup[], added: readonly GroupView[]): DraftGroup[] {
  const taken = new Set(groups.map(({ name }) => name))
  return added.map((group) => {
    let name = group.name
    for (let number = 2; taken.has(name); number++) name = `${group.name} ${number}`
    taken.add(name)
    return { ...group, name }
  })
}

/** Labels as typed: one a line, or with commas between; spaces belong to a label. */
export const labelsOf = (text: string): string[] =>
  text
    .split(/[\n,]/)
    .map((label) => label.trim())
    .filter(Boolean)

/** How many groups, and what demands attention, in a sentence. */
export function groupsSentence({ recognised, confirmed, complete }: GroupsView): string {
  const shown = confirmed ?? recognised
  const weak = shown.filter(({ penalty }) => penalty?.verdict === 'may be too weak').length
  const found =
    recognised.length > 0
      ? `${formatCount(recognised.length, 'group')} recognised in the coefficients; nobody has confirmed them yet.`
      : 'None was recognised in the coefficients.'
  const kept = confirmed?.length ? `${formatCount(confirmed.length, 'group')} confirmed.` : 'None is confirmed.'
  const parts = [
    confirmed ? kept : found,
    weak > 0 && `${formatNumber(weak)} with a penalty that may be too weak.`,
    !complete && 'Not all couplings were looked at: there are too many.',
  ]
  return parts.filter(Boolean).join(' ')
}

/** What is sent: members by label, without the figures. */
export const requestOf = (groups: readonly DraftGroup[], version: number): SaveGroups => ({
  version,
  groups: groups.map(({ name, kind, k, members, source }) => ({ name, kind, k, members, source })),
})

/** One line a member: group, kind, k, label. */
export function groupsCsv(groups: readonly DraftGroup[]): string {
  const lines = groups.flatMap(({ name, kind, k, members }) =>
    members.map((label) => [csvCell(name), kind, k, csvCell(label)].join(',')),
  )
  return ['group,kind,k,variable', ...lines, ''].join('\n')
}
