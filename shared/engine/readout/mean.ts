/** The mean of a weighted list and its standard error, from the spread of the values; counts are numbers of reads. */
export interface Mean {
  readonly mean: number
  /** Sample standard deviation over √n; 0 for a single value, for it tells of no spread. */
  readonly standardError: number
}

/**
 * @param values one per row
 * @param counts how many times each value was seen
 * @throws RangeError without a single read, or for lists of different lengths
 */
export function meanOf(values: ArrayLike<number>, counts: ArrayLike<number>): Mean {
  if (values.length !== counts.length) throw new RangeError(`${counts.length} counts for ${values.length} values`)
  let n = 0
  let sum = 0
  for (let k = 0; k < values.length; k++) {
    n += counts[k]!
    sum += counts[k]! * values[k]!
  }
  if (n === 0) throw new RangeError('there is no read to take a mean of')
  const mean = sum / n
  let squares = 0
  for (let k = 0; k < values.length; k++) squares += counts[k]! * (values[k]! - mean) ** 2
  return { mean, standardError: n > 1 ? Math.sqrt(squares / (n - 1) / n) : 0 }
}
