import { assembleReading } from './assemble'
import type { ProblemReading, ReadOptions } from './format'
import { Rejections } from './rejections'

/** The reading of a file of which nothing can be understood. */
export function emptyReading(format: string, options: ReadOptions, message: string): ProblemReading {
  return assembleReading(
    {
      format,
      labels: [],
      rows: [],
      cols: [],
      values: [],
      isMatrix: false,
      directives: {},
      header: null,
      rejections: new Rejections(),
      issues: [{ message }],
    },
    options,
  )
}
