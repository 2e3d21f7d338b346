/** Variables of files that state only how many there are: named 0 … n − 1. */

/** A stated count costs no bytes of the file, so it has a limit of its own. */
export const MAX_STATED_VARIABLES = 1_000_000

export const countedLabels = (n: number): string[] => Array.from({ length: n }, (_, i) => String(i))

/** Whether the labels are the ones that a file without labels gets. */
export const isCounted = (labels: readonly string[]): boolean => labels.every((label, i) => label === String(i))
