import { INLAYS, type Tree } from './plate'

export interface Ground {
  columns: number
  rows: number
  /** How often a tree is tried; those that would lie on another are left out. */
  tries: number
}

export const GROUND: Ground = { columns: 44, rows: 56, tries: 900 }

/** A small linear congruential generator (Numerical Recipes constants): a picture needs no better one. */
function lcg(seed: number) {
  let state = seed >>> 0
  return (below: number) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return Math.floor((state / 2 ** 32) * below)
  }
}

/** Cells of rows and columns already taken, with one cell of air at the ends. */
class Taken {
  private readonly cells = new Set<string>()

  private *along(kind: 'row' | 'column', line: number, from: number, to: number) {
    for (let at = from; at <= to; at += 1) yield `${kind} ${line} ${at}`
  }

  isFree(kind: 'row' | 'column', line: number, from: number, to: number): boolean {
    for (const cell of this.along(kind, line, from - 1, to + 1)) if (this.cells.has(cell)) return false
    return true
  }

  take(kind: 'row' | 'column', line: number, from: number, to: number): void {
    for (const cell of this.along(kind, line, from, to)) this.cells.add(cell)
  }
}

type Arm = Tree['arms'][number]

function armFits(arm: Arm, taken: Taken): boolean {
  return (
    taken.isFree('row', arm.row, arm.left, arm.right) &&
    taken.isFree('column', arm.left, arm.leftTop, arm.row) &&
    taken.isFree('column', arm.right, arm.rightTop, arm.row)
  )
}

function takeTree(tree: Tree, taken: Taken) {
  taken.take('column', tree.trunk, tree.top, tree.foot)
  for (const arm of tree.arms) {
    taken.take('row', arm.row, arm.left, arm.right)
    taken.take('column', arm.left, arm.leftTop, arm.row)
    taken.take('column', arm.right, arm.rightTop, arm.row)
  }
}

function growTree(draw: (below: number) => number, ground: Ground, inlay: Tree['inlay']): Tree {
  const foot = 8 + draw(ground.rows - 6)
  const trunk = draw(ground.columns)
  const tiers = 2 + draw(3)
  const spread = 2 + draw(3)
  const lift = 3 + draw(3)
  const top = foot - 3 - tiers * lift - draw(5)
  const arms = Array.from({ length: tiers }, (_, tier) => {
    const half = spread * (tiers - tier)
    const row = foot - 3 - tier * lift
    return { row, left: trunk - half, right: trunk + half, leftTop: top + draw(3), rightTop: top + draw(3) }
  })
  return { trunk, foot, top, inlay, arms }
}

/** Plants trees until the ground is full: the same seed always gives the same plate. */
export function plantTrees(seed: number, ground: Ground = GROUND): Tree[] {
  const draw = lcg(seed)
  const taken = new Taken()
  const trees: Tree[] = []
  for (let attempt = 0; attempt < ground.tries; attempt += 1) {
    const tree = growTree(draw, ground, INLAYS[trees.length % INLAYS.length] ?? 'plain')
    if (!taken.isFree('column', tree.trunk, tree.top, tree.foot)) continue
    const arms = tree.arms.filter((arm) => armFits(arm, taken))
    if (arms.length < 2) continue
    const planted = { ...tree, arms }
    takeTree(planted, taken)
    trees.push(planted)
  }
  return trees
}
