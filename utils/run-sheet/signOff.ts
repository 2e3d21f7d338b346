import type { RemarkView, RunSheetView } from '#shared/schemas/run-sheets'

export type SignOffStep = 'submit' | 'approve' | 'send-back' | 'issue'

/** A name on a line of the sign-off box. */
export interface SignOffMark {
  name: string
  what: string
  at: string
}

/** Who said it, and in whose place. */
export function signerOf({ by, for: away }: Pick<RemarkView, 'by' | 'for'>): string {
  const name = by?.name ?? 'someone who left'
  return away ? `${name}, for ${away.name}` : name
}

/** Who signed which part, read from the hand-overs; a sheet that was sent back shows the reviewer who did it. */
export function signOffSteps(
  sheet: Pick<RunSheetView, 'remarks' | 'preparedBy' | 'createdAt' | 'state'>,
): Record<'prepared' | 'reviewed' | 'issued', SignOffMark | null> {
  const last = (...steps: string[]): SignOffMark | null => {
    const remark = sheet.remarks.findLast(({ what }) => steps.includes(what))
    return remark ? { name: signerOf(remark), what: remark.what, at: remark.at } : null
  }
  const waits = sheet.state === 'draft' || sheet.state === 'in review'
  return {
    prepared: last('submitted for review') ?? { name: sheet.preparedBy.name, what: 'prepared', at: sheet.createdAt },
    reviewed: waits ? null : last('approved', 'sent back'),
    issued: last('issued'),
  }
}
