import type { Issue } from '#shared/errors'

/** Splits issues into those of a form's own fields, by field, and the rest. */
export function fieldIssues<K extends string>(
  issues: readonly Issue[],
  fields: readonly K[],
): { byField: Partial<Record<K, string>>; others: Issue[] } {
  const byField: Partial<Record<K, string>> = {}
  const others: Issue[] = []
  for (const issue of issues) {
    const field = fields.find((name) => name === issue.path)
    if (field) byField[field] ??= sentence(issue.message)
    else others.push(issue)
  }
  return { byField, others }
}

/** Schema messages are written to stand after a name; under a field they stand alone. */
function sentence(message: string): string {
  const ended = /[.!?]$/.test(message) ? message : `${message}.`
  return ended.charAt(0).toUpperCase() + ended.slice(1)
}
