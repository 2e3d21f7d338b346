import { describe, expect, it } from 'vitest'
import { drawPlate } from '../../../../utils/ui/plate'
import { plantTrees } from '../../../../utils/ui/plateTrees'

describe('plantTrees', () => {
  it('always plants the same trees', () => {
    expect(plantTrees(7)).toEqual(plantTrees(7))
    expect(plantTrees(8)).not.toEqual(plantTrees(7))
  })

  it('lays no band on another', () => {
    const cells = new Map<string, number>()
    for (const [index, tree] of plantTrees(7).entries()) {
      for (const arm of tree.arms) {
        for (let column = arm.left; column <= arm.right; column += 1) {
          const key = `${arm.row} ${column}`
          expect(cells.get(key) ?? index).toBe(index)
          cells.set(key, index)
        }
      }
    }
    expect(cells.size).toBeGreaterThan(200)
  })
})

it('weaves: about half of the crossings pass over', () => {
  const cross = [
    { trunk: 5, foot: 20, top: 0, inlay: 'plain' as const, arms: [] },
    {
      trunk: 12,
      foot: 20,
      top: 0,
      inlay: 'line' as const,
      arms: [8, 11].map((row) => ({ row, left: 2, right: 14, leftTop: row, rightTop: row })),
    },
  ]
  const over = drawPlate(cross).layers.filter((layer) => layer.layer === 'over')
  expect(over).toHaveLength(1)
  expect(over[0]?.d).toBe('M110 220v20')
})
