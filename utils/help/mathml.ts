import { h, type VNode } from 'vue'
import type { Expr, Formula } from './formula'
import { isCompound } from './formula'

/** Formulas set as MathML. */

const FOLDS = { sum: '∑', greatest: 'max' } as const

const operator = (sign: string, attributes: Record<string, string> = {}) => h('mo', attributes, sign)
const row = (...parts: VNode[]) => h('mrow', parts)
const inBrackets = (part: VNode, [open, close] = ['(', ')']) => row(operator(open!), part, operator(close!))

function joined(parts: readonly Expr[], between: () => VNode, set: (part: Expr) => VNode): VNode {
  return row(...parts.flatMap((part, k) => (k === 0 ? [set(part)] : [between(), set(part)])))
}

/** `J_rms` becomes J with rms beneath it; letters slant, words stand upright. */
function setSymbol(symbol: string): VNode {
  const [base = '', index] = symbol.split('_')
  const letter = h('mi', base)
  if (!index) return letter
  const isWord = index.length > 1 && index !== 'ij'
  return h('msub', [letter, isWord ? h('mtext', index) : h('mi', index)])
}

/** A number before a bracket or a letter needs no sign; two numbers, or a letter before a bracket, need one. */
const product = (parts: readonly Expr[]) =>
  joined(parts, () => operator('·', { lspace: '0.15em', rspace: '0.15em' }), setFactor)

const setFactor = (part: Expr): VNode => (isCompound(part) ? inBrackets(setExpr(part)) : setExpr(part))

function setExpr(expr: Expr): VNode {
  if (typeof expr === 'number') return h('mn', String(expr))
  if (typeof expr === 'string') return setSymbol(expr)
  switch (expr.op) {
    case 'plus':
      return joined(expr.of, () => operator('+'), setExpr)
    case 'times':
      return product(expr.of)
    case 'minus':
      return row(setExpr(expr.a), operator('−'), setFactor(expr.b))
    case 'plusMinus':
      return row(setExpr(expr.a), operator('±'), setFactor(expr.b))
    case 'over':
      return h('mfrac', [setExpr(expr.a), setExpr(expr.b)])
    case 'root':
      return h('msqrt', [setExpr(expr.of)])
    case 'size':
      return inBrackets(setExpr(expr.of), ['|', '|'])
    case 'square':
      return h('msup', [setFactor(expr.of), h('mn', '2')])
    case 'most':
    case 'least':
      return row(
        h('mi', { mathvariant: 'normal' }, expr.op === 'most' ? 'max' : 'min'),
        inBrackets(joined(expr.of, () => operator(','), setExpr)),
      )
    default:
      return row(
        h('munder', [operator(FOLDS[expr.op], { movablelimits: 'false' }), h('mi', expr.index)]),
        setFactor(expr.body),
      )
  }
}

/** A formula as mathematics. Hidden from screen readers: it is spoken in words beside it. */
export const setFormula = ({ symbol, expr }: Formula): VNode =>
  h('math', { 'aria-hidden': 'true', display: 'block' }, [row(setSymbol(symbol), operator('='), setExpr(expr))])
