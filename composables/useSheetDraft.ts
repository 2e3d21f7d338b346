import { parseDefectText } from '#shared/engine/machine/defects'
import type { ApiFailure } from './useApi'
import { formatCount } from '~/utils/format'
import type { SheetDraft } from '~/utils/machine/sheet'
import { sheetProblems } from '~/utils/machine/sheet'
import { issuesInForm, refusedFields } from '~/utils/machine/sheet-issues'

/** What is wrong with a sheet as typed: by the form's own rules, and by what the server answered. */
export function useSheetDraft(draft: () => SheetDraft, failure: () => ApiFailure | null) {
  const own = computed(() => sheetProblems(draft()))
  const rejected = computed(() => parseDefectText(draft().defects).rejected.length)
  const issues = computed(() => issuesInForm(failure()?.issues ?? [], draft().defects))
  return {
    /** By field. */
    problems: computed(() => ({ ...refusedFields(failure()?.issues ?? []), ...own.value })),
    /** The server's, in the words of the form. */
    issues,
    refusedLines: computed(() => issues.value.flatMap(({ line }) => line ?? [])),
    /** Sentences, as long as the sheet cannot be sent. */
    wrong: computed(() => [
      ...Object.values(own.value),
      ...(rejected.value
        ? [`${formatCount(rejected.value, 'entry', 'entries')} of the missing parts cannot be read.`]
        : []),
    ]),
  }
}
