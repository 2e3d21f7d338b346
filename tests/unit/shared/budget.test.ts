import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { PlannedEntry, PoolAmount } from '../../../shared/budget'
import { BUDGET_ACCOUNTS, BUDGET_MOVES, planRelease, planReservation, planSettlement } from '../../../shared/budget'

/** Books kept the plain way: a number for each account of each pool. */
class Books {
  readonly pools = new Map<string | null, Record<string, number>>()
  of(pool: string | null): Record<string, number> {
    const known = this.pools.get(pool)
    if (known) return known
    const fresh = Object.fromEntries(BUDGET_ACCOUNTS.map((account) => [account, 0]))
    this.pools.set(pool, fresh)
    return fresh
  }
  enter(entries: readonly PlannedEntry[]): void {
    for (const { move, machineId, microseconds } of entries) {
      expect(Number.isSafeInteger(microseconds) && microseconds > 0).toBe(true)
      this.of(machineId)[BUDGET_MOVES[move].from]! -= microseconds
      this.of(machineId)[BUDGET_MOVES[move].to]! += microseconds
    }
  }
  amounts(account: string): PoolAmount[] {
    return [...this.pools].map(([machineId, pool]) => ({ machineId, microseconds: pool[account]! }))
  }
}

const total = (amounts: readonly PoolAmount[]) => amounts.reduce((sum, { microseconds }) => sum + microseconds, 0)

describe('planReservation', () => {
  const available = [
    { machineId: null, microseconds: 50 },
    { machineId: 'alder', microseconds: 30 },
    { machineId: 'juniper', microseconds: 900 },
  ]
  it('takes the machine’s own time first, then time for any machine', () => {
    expect(planReservation(available, 'alder', 20)).toEqual([{ move: 'reserve', machineId: 'alder', microseconds: 20 }])
    expect(planReservation(available, 'alder', 80)).toEqual([
      { move: 'reserve', machineId: 'alder', microseconds: 30 },
      { move: 'reserve', machineId: null, microseconds: 50 },
    ])
    expect(planReservation(available, 'rowan', 50)).toEqual([{ move: 'reserve', machineId: null, microseconds: 50 }])
  })
  it('plans nothing where there is not enough, and takes nothing from an overdrawn pool', () => {
    expect(planReservation(available, 'alder', 81)).toBeNull()
    expect(planReservation([{ machineId: 'alder', microseconds: -5 }], 'alder', 1)).toBeNull()
    expect(
      planReservation(
        [
          { machineId: 'alder', microseconds: -5 },
          { machineId: null, microseconds: 1 },
        ],
        'alder',
        1,
      ),
    ).toEqual([{ move: 'reserve', machineId: null, microseconds: 1 }])
  })
})

describe('planSettlement', () => {
  const held = [
    { machineId: 'alder', microseconds: 30 },
    { machineId: null, microseconds: 50 },
  ]
  it('spends what was used and frees the rest', () => {
    expect(planSettlement(held, 40, 'alder')).toEqual([
      { move: 'settle', machineId: 'alder', microseconds: 30 },
      { move: 'settle', machineId: null, microseconds: 10 },
      { move: 'release', machineId: null, microseconds: 40 },
    ])
    expect(planSettlement(held, 0, 'alder')).toEqual(planRelease(held))
  })
  it('charges what was used beyond', () => {
    expect(planSettlement(held, 100, 'alder')).toContainEqual({ move: 'charge', machineId: 'alder', microseconds: 20 })
    expect(planSettlement([], 7, null)).toEqual([{ move: 'charge', machineId: null, microseconds: 7 }])
  })
})

it('always balances, never reserves more than there is, and holds nothing after a settlement', () => {
  const machine = fc.constantFrom('alder', 'juniper')
  const amount = fc.integer({ min: 1, max: 2 ** 40 })
  const step = fc.oneof(
    fc.record({ what: fc.constant('grant' as const), pool: fc.option(machine), amount }),
    fc.record({
      what: fc.constant('run' as const),
      pool: machine,
      amount,
      share: fc.double({ min: 0, max: 2, noNaN: true }),
    }),
    fc.record({ what: fc.constant('drop' as const), pool: machine, amount }),
  )
  fc.assert(
    fc.property(fc.array(step, { maxLength: 40 }), (steps) => {
      const books = new Books()
      for (const one of steps) {
        if (one.what === 'grant') {
          books.enter([{ move: 'grant', machineId: one.pool, microseconds: one.amount }])
          continue
        }
        const before = total(books.amounts('reserved'))
        const planned = planReservation(books.amounts('available'), one.pool, one.amount)
        if (!planned) continue
        expect(total(planned)).toBe(one.amount)
        const free = new Map(books.amounts('available').map((pool) => [pool.machineId, pool.microseconds]))
        for (const { machineId, microseconds } of planned)
          expect(microseconds).toBeLessThanOrEqual(free.get(machineId)!)
        books.enter(planned)
        const actual = one.what === 'run' ? Math.round(one.amount * one.share) : null
        books.enter(actual === null ? planRelease(planned) : planSettlement(planned, actual, one.pool))
        expect(total(books.amounts('reserved'))).toBe(before)
      }
      for (const [, { granted, available, reserved, spent }] of books.pools) {
        expect(granted! + available! + reserved! + spent!).toBe(0)
        expect(reserved).toBeGreaterThanOrEqual(0)
        expect(spent).toBeGreaterThanOrEqual(0)
      }
    }),
  )
})
