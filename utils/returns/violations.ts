import type { ReturnView } from '#shared/schemas/returns'
import type { HelpCase, HelpRequest } from '../help/registry'

const FORMAT = { significant: 3 }

/** The computed column of broken groups, explained group by group. */
export function violationColumns({ violations, source }: Pick<ReturnView, 'violations' | 'source'>) {
  const rehearsal = source === 'rehearsal'
  const helpOf = (count: number, total: number, counted: string): HelpRequest => ({
    id: 'rate',
    given: { count, total, counted, of: 'reads kept by the decoding', format: FORMAT, rehearsal },
  })
  return [
    {
      label: 'Share',
      name: 'the share of reads that break a group',
      cases: (): readonly HelpCase[] =>
        violations
          ? [
              ...violations.groups.map(({ name, count, total }) => ({
                label: name,
                help: helpOf(count, total, 'reads that break the group'),
              })),
              {
                label: 'any of them',
                help: helpOf(violations.any.count, violations.any.total, 'reads that break one group or more'),
              },
            ]
          : [],
    },
  ] as const
}
