import fc from 'fast-check'
import { expect, it } from 'vitest'
import { UseOrder } from '../../../../server/rate-limit/use-order'

type Step = { what: 'set' | 'delete' | 'oldest'; key: string }

const steps = fc.array(
  fc.record<Step>({ what: fc.constantFrom('set', 'set', 'delete', 'oldest'), key: fc.constantFrom(...'abcde') }),
  { maxLength: 100 },
)

it('knows what a plain list of keys in the order of their use knows', () => {
  fc.assert(
    fc.property(steps, (taken) => {
      const order = new UseOrder<{ step: number }>()
      let list: { key: string; step: number }[] = []
      for (const [step, { what, key }] of taken.entries()) {
        if (what === 'oldest') expect(order.oldest()).toBe(list[0]?.key)
        else list = list.filter((one) => one.key !== key)
        if (what === 'delete') order.delete(key)
        if (what === 'set') {
          order.set(key, { step })
          list.push({ key, step })
        }
        expect(order.size).toBe(list.length)
        for (const one of 'abcde') expect(order.get(one)?.step).toBe(list.find((it) => it.key === one)?.step)
      }
      // Until nothing is left, as when all are forgotten.
      for (const { key } of list) {
        expect(order.oldest()).toBe(key)
        order.delete(key)
      }
      expect(order.oldest()).toBeUndefined()
    }),
  )
})
