/** A part of a machine as it is named in a defect list: a qubit, or the coupler between two. */
export type DefectPart = readonly [qubit: number] | readonly [qubit: number, other: number]

const ENTRY = /(?<![^\s,;])\d+(?:\s*[-\u2013\u2014\u2212]\s*\d+)*(?![^\s,;])/g
/** Characters of a line up to which another entry is added to it. */
const LONGEST_LINE = 100

const isPart = (entry: string, part: DefectPart): boolean => {
  const numbers = entry.match(/\d+/g)!.map(Number)
  if (numbers.length !== part.length) return false
  const [a, b] = numbers
  return part.length === 1 ? a === part[0] : (a === part[0] && b === part[1]) || (a === part[1] && b === part[0])
}

/** The line without the part; null where nothing but separators would be left of one that held it. */
function lineWithout(line: string, part: DefectPart): string | null {
  const [, list = '', comment = ''] = /^([^#]*)(#.*)?$/.exec(line) ?? []
  const kept = [...list.matchAll(ENTRY)].filter(([entry]) => isPart(entry, part))
  if (kept.length === 0) return line
  const left = list
    .replace(ENTRY, (entry) => (isPart(entry, part) ? '' : entry))
    .replace(/([,;]\s*)+(?=[,;])/g, '')
    .replace(/^[\s,;]+|[\s,;]+$/g, '')
  if (left === '' && comment === '') return null
  return left === '' ? comment : comment === '' ? left : `${left} ${comment}`
}

const withoutPart = (text: string, part: DefectPart): string =>
  text
    .split(/\r\n|\r|\n/)
    .flatMap((line) => lineWithout(line, part) ?? [])
    .join('\n')

/**
 * A defect list as text in which the part is missing, or is not, whatever it said before: every mention is taken out,
 * or one is added at the end. Comments, order and all other entries stay as they were typed.
 */
export function withPart(text: string, part: DefectPart, isMissing: boolean): string {
  const rest = withoutPart(text, part)
  if (!isMissing) return rest
  const entry = part.join('-')
  const last = rest.slice(rest.lastIndexOf('\n') + 1)
  if (rest === '' || rest.endsWith('\n')) return rest + entry
  return last.includes('#') || last.length > LONGEST_LINE ? `${rest}\n${entry}` : `${rest}, ${entry}`
}
