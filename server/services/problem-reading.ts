import type { FileReading } from '../../shared/engine/formats/format'
import { DomainError } from '../../shared/errors'
import { PROBLEM_FORMATS } from '../../shared/problem-formats'
import type { ReadingView } from '../../shared/schemas/problems'

/** What was understood, as it is shown and kept with the problem. */
export function readingView(reading: FileReading): ReadingView {
  const { form, formSource, formatSource, likenesses, container, convention, sense, triangle } = reading
  const format = reading.format as ReadingView['format']
  const { entriesRead, duplicatesSummed, zerosDropped, firstRows, rejected, rejectedCount } = reading
  return {
    format,
    formatTitle: PROBLEM_FORMATS[format].name,
    formatSource,
    likenesses: likenesses.map((likeness) => ({ ...likeness }) as { format: ReadingView['format']; score: number }),
    container,
    form,
    formSource,
    convention,
    sense,
    triangle,
    entriesRead,
    duplicatesSummed,
    zerosDropped,
    firstRows,
    rejected: [...rejected],
    rejectedCount,
  }
}

const plural = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

export function warningsOf(reading: FileReading): string[] {
  const warnings: string[] = []
  if (reading.rejectedCount > 0) warnings.push(`${plural(reading.rejectedCount, 'line')} could not be read.`)
  if (reading.duplicatesSummed > 0)
    warnings.push(`${plural(reading.duplicatesSummed, 'duplicate entry', 'duplicate entries')} summed.`)
  if (reading.zerosDropped > 0)
    warnings.push(
      `${plural(reading.zerosDropped, 'pair')} came to zero and ${reading.zerosDropped === 1 ? 'was' : 'were'} dropped.`,
    )
  if (reading.triangle === 'both' && reading.format !== 'max-cut')
    warnings.push('Entries stand in both triangles without mirroring each other; each pair was summed.')
  if (reading.header) warnings.push(`Line ${reading.header.line} was taken for column names.`)
  if (reading.sense === 'max') warnings.push('To be maximised: values are negated inside and shown in their own sense.')
  return warnings
}

const SHOWN_LINES = 100

/** Why a file with rejected lines is not saved just like that. */
export function rejectedLines(fileName: string, reading: FileReading): DomainError {
  const first = reading.rejected[0]!
  return new DomainError(
    'not acceptable',
    'problem.rejected-lines',
    `${fileName}: ${plural(reading.rejectedCount, 'line')} could not be read, the first at line ${first.line}: ${first.reason}. Correct the file, or save without ${reading.rejectedCount === 1 ? 'this line' : 'these lines'}.`,
    reading.rejected.slice(0, SHOWN_LINES).map(({ line, reason }) => ({ line, message: reason })),
  )
}

/** Why no problem came of a file: it is not what a format makes of bytes at all, or what it says cannot be accepted. */
export function unreadable(fileName: string, reading: FileReading): DomainError {
  const issues = [
    ...reading.issues,
    ...reading.rejected.slice(0, SHOWN_LINES).map(({ line, reason }) => ({ line, message: reason })),
  ]
  return new DomainError(
    reading.isReadToEnd ? 'not acceptable' : 'unreadable',
    'problem.unreadable',
    `${fileName}: ${reading.issues[0]?.message ?? 'nothing could be read'}`,
    issues,
  )
}
