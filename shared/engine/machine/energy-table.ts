/**
 * The energies of a machine over the anneal: A(s) of the transverse field and B(s) of the problem in
 * H(s) = −A(s)/2 Σ σx_i + B(s)/2 (Σ h_i σz_i + Σ J_ij σz_i σz_j), both as frequencies E/h in GHz, at rising s from 0 to 1;
 * linear between the rows (docs/formulas.md, Energy table).
 */
export interface EnergyTable {
  readonly s: readonly number[]
  readonly A: readonly number[]
  readonly B: readonly number[]
}

export const ENERGY_TABLE_LIMITS = { rows: 2000, gigahertz: 10_000 } as const

/** What is wrong with one row, counted from 0. */
export interface EnergyTableIssue {
  readonly row: number
  readonly column: 's' | 'A' | 'B'
  readonly message: string
}

type Column = EnergyTableIssue['column']

/** @returns what is wrong with a value by itself, null for a number in range */
function valueProblem(column: Column, value: number | undefined): string | null {
  if (value === undefined || !Number.isFinite(value)) return `${column} is not a number`
  const [most, unit] = column === 's' ? [1, ''] : [ENERGY_TABLE_LIMITS.gigahertz, ' GHz']
  return value >= 0 && value <= most ? null : `${column} = ${value}${unit} is outside 0 to ${most}${unit}`
}

/** @returns what is wrong with a value after the one before it */
function stepProblem(column: Column, before: number, value: number): string | null {
  if (column === 's' && value <= before) return `s = ${value} does not rise from ${before}`
  if (column === 'A' && value > before) return `A rises from ${before} to ${value} GHz; it must fall`
  if (column === 'B' && value < before) return `B falls from ${before} to ${value} GHz; it must rise`
  return null
}

/**
 * Everything that is wrong with a table: s must run from 0 to 1 and rise in every row, A must never rise and B never
 * fall, all finite and not negative. Empty when it can be used.
 */
export function energyTableIssues(table: EnergyTable): EnergyTableIssue[] {
  const issues: EnergyTableIssue[] = []
  const rows = Math.max(table.s.length, table.A.length, table.B.length)
  if (rows < 2) return [{ row: 0, column: 's', message: 'a table has at least two rows, s = 0 and s = 1' }]
  if (rows > ENERGY_TABLE_LIMITS.rows)
    return [
      { row: ENERGY_TABLE_LIMITS.rows, column: 's', message: `a table has at most ${ENERGY_TABLE_LIMITS.rows} rows` },
    ]
  for (const column of ['s', 'A', 'B'] as const) {
    const values = table[column]
    for (let row = 0; row < rows; row++) {
      const alone = valueProblem(column, values[row])
      const message = alone ?? (row > 0 ? stepProblem(column, values[row - 1]!, values[row]!) : null)
      if (message !== null) issues.push({ row, column, message })
    }
  }
  if (table.s[0] !== 0) issues.push({ row: 0, column: 's', message: `the first row must be s = 0, not ${table.s[0]}` })
  if (table.s[rows - 1] !== 1)
    issues.push({ row: rows - 1, column: 's', message: `the last row must be s = 1, not ${table.s[rows - 1]}` })
  return issues.sort((a, b) => a.row - b.row)
}
