import type { Expr, Formula } from './formula'
import { isCompound } from './formula'

/** Formulas read aloud, with the names of the inputs in place of their symbols. */

type Names = Readonly<Record<string, string>>

const FOLDS = { sum: 'the sum of', greatest: 'the largest of' } as const

function grouped(expr: Expr, names: Names): string {
  const words = spoken(expr, names)
  const isLong = isCompound(expr) || (typeof expr === 'object' && (expr.op === 'times' || expr.op === 'over'))
  return isLong ? `open bracket ${words} close bracket` : words
}

/** An expression in words. */
export function spoken(expr: Expr, names: Names): string {
  if (typeof expr === 'number') return String(expr)
  if (typeof expr === 'string') return names[expr] ?? expr
  switch (expr.op) {
    case 'plus':
      return expr.of.map((part) => spoken(part, names)).join(' plus ')
    case 'times':
      return expr.of.map((part) => (isCompound(part) ? grouped(part, names) : spoken(part, names))).join(' times ')
    case 'minus':
      return `${spoken(expr.a, names)} minus ${grouped(expr.b, names)}`
    case 'over':
      return `${grouped(expr.a, names)} divided by ${grouped(expr.b, names)}`
    case 'plusMinus':
      return `${spoken(expr.a, names)} plus or minus ${grouped(expr.b, names)}`
    case 'root':
      return `the square root of ${grouped(expr.of, names)}`
    case 'size':
      return `the size of ${grouped(expr.of, names)}`
    case 'square':
      return `${grouped(expr.of, names)} squared`
    case 'most':
    case 'least': {
      const parts = expr.of.map((part) => grouped(part, names)).join(' and ')
      return `the ${expr.op === 'most' ? 'larger' : 'smaller'} of ${parts}`
    }
    default:
      return `${FOLDS[expr.op]} ${grouped(expr.body, names)}`
  }
}

export const spokenFormula = ({ symbol, expr }: Formula, names: Names): string =>
  `${names[symbol] ?? symbol} is ${spoken(expr, names)}`
