/**
 * Formulas as data: the same tree is set as mathematics, spoken, and worked out from the inputs listed beside it, so that
 * what is shown is what was computed.
 */

/** A symbol is a letter with an optional index after `_`: `n`, `J_rms`, `σ_J`. */
export type Expr =
  | number
  | string
  | { readonly op: 'plus' | 'times'; readonly of: readonly Expr[] }
  | { readonly op: 'minus' | 'over' | 'plusMinus'; readonly a: Expr; readonly b: Expr }
  | { readonly op: 'root' | 'size' | 'square'; readonly of: Expr }
  /** The largest of a few values. */
  | { readonly op: 'most' | 'least'; readonly of: readonly Expr[] }
  /** Over all values of a list; symbols of lists in the body stand for one value each. */
  | { readonly op: 'sum' | 'greatest'; readonly index: string; readonly body: Expr }

/** `symbol = expr`. */
export interface Formula {
  readonly symbol: string
  readonly expr: Expr
}

/** Values of symbols; lists are of equal length. */
export type Values = Readonly<Record<string, number | readonly number[]>>

export const plus = (...of: Expr[]): Expr => ({ op: 'plus', of })
export const times = (...of: Expr[]): Expr => ({ op: 'times', of })
export const minus = (a: Expr, b: Expr): Expr => ({ op: 'minus', a, b })
export const over = (a: Expr, b: Expr): Expr => ({ op: 'over', a, b })
export const plusMinus = (a: Expr, b: Expr): Expr => ({ op: 'plusMinus', a, b })
export const root = (of: Expr): Expr => ({ op: 'root', of })
export const size = (of: Expr): Expr => ({ op: 'size', of })
export const square = (of: Expr): Expr => ({ op: 'square', of })
export const most = (...of: Expr[]): Expr => ({ op: 'most', of })
export const least = (...of: Expr[]): Expr => ({ op: 'least', of })
export const sum = (index: string, body: Expr): Expr => ({ op: 'sum', index, body })
export const greatest = (index: string, body: Expr): Expr => ({ op: 'greatest', index, body })

function valueOf(symbol: string, values: Values, place: number | null): number {
  const value = values[symbol]
  if (value === undefined) throw new RangeError(`no input for ${symbol}`)
  if (typeof value === 'number') return value
  const item = place === null ? undefined : value[place]
  if (item === undefined) throw new RangeError(`${symbol} is a list`)
  return item
}

/** Symbols in an expression, each once. */
export function symbolsOf(expr: Expr): string[] {
  if (typeof expr === 'number') return []
  if (typeof expr === 'string') return [expr]
  if ('body' in expr) return symbolsOf(expr.body)
  const parts =
    'a' in expr ? [expr.a, expr.b] : typeof expr.of === 'object' && Array.isArray(expr.of) ? expr.of : [expr.of]
  return [...new Set((parts as Expr[]).flatMap(symbolsOf))]
}

function lengthOf(body: Expr, values: Values): number {
  const lists = symbolsOf(body).flatMap((symbol) => {
    const value = values[symbol]
    return typeof value === 'object' ? [value.length] : []
  })
  return lists[0] ?? 0
}

/**
 * Works an expression out.
 * @param sign of the second term of ±
 * @throws RangeError for a symbol without a value, or a list outside a sum
 */
export function evaluate(expr: Expr, values: Values, sign: 1 | -1 = 1, place: number | null = null): number {
  const at = (part: Expr): number => evaluate(part, values, sign, place)
  if (typeof expr === 'number') return expr
  if (typeof expr === 'string') return valueOf(expr, values, place)
  switch (expr.op) {
    case 'plus':
      return expr.of.reduce<number>((total, part) => total + at(part), 0)
    case 'times':
      return expr.of.reduce<number>((product, part) => product * at(part), 1)
    case 'minus':
      return at(expr.a) - at(expr.b)
    case 'over':
      return at(expr.a) / at(expr.b)
    case 'plusMinus':
      return at(expr.a) + sign * at(expr.b)
    case 'root':
      return Math.sqrt(at(expr.of))
    case 'size':
      return Math.abs(at(expr.of))
    case 'square':
      return at(expr.of) ** 2
    case 'most':
      return Math.max(...expr.of.map(at))
    case 'least':
      return Math.min(...expr.of.map(at))
    default: {
      const items = Array.from({ length: lengthOf(expr.body, values) }, (_, k) => evaluate(expr.body, values, sign, k))
      if (expr.op === 'sum') return items.reduce((total, item) => total + item, 0)
      return Math.max(...items)
    }
  }
}

/** Whether ± occurs, so that there are two values. */
export function isTwofold(expr: Expr): boolean {
  if (typeof expr !== 'object') return false
  if (expr.op === 'plusMinus') return true
  if ('body' in expr) return isTwofold(expr.body)
  const parts =
    'a' in expr ? [expr.a, expr.b] : Array.isArray(expr.of) ? (expr.of as readonly Expr[]) : [expr.of as Expr]
  return parts.some(isTwofold)
}

/** Whether brackets are needed where the expression stands as a factor or under a square. */
export function isCompound(expr: Expr): boolean {
  return typeof expr === 'object' && ['plus', 'minus', 'plusMinus', 'sum'].includes(expr.op)
}
