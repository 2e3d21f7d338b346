import { describe, expect, it } from 'vitest'
import type { ScanPoint, ScanView } from '../../../../shared/schemas/scans'
import {
  breakSeries,
  energySeries,
  kneeText,
  logSpaced,
  scanRange,
  successSeries,
} from '../../../../utils/run-sheet/scan'

const rate = (count: number, total: number) => ({ count, total, rate: count / total, low: 0.1, high: 0.2 })
const point = (strength: number, success: number | null): ScanPoint => ({
  strength,
  scale: 0.5,
  reads: 100,
  brokenChains: { mean: 0.12, low: 0.1, high: 0.14 },
  readsWithBreak: rate(15, 100),
  energy: { mean: -3, standardError: 0.25, best: -7 },
  success: success === null ? null : rate(success, 100),
  seconds: 1,
})
const scan = (change: Partial<ScanView> = {}): ScanView => ({
  id: 's',
  number: 1,
  status: 'ready',
  jobId: null,
  made: { strengths: [1, 2], reads: 100, sweeps: 10, controlError: false, seed: 1 },
  points: [point(1, 3), point(2, 5)],
  knee: { strength: 2, edge: null },
  reason: null,
  seconds: 1,
  version: '0',
  by: { id: 'u', name: 'U' },
  createdAt: '2026-12-02T00:00:00.000Z',
  ...change,
})

describe('strengths to try', () => {
  it('stand evenly apart on a logarithmic scale, in three digits, each once', () => {
    expect(logSpaced(1, 16, 5)).toEqual([1, 2, 4, 8, 16])
    expect(logSpaced(0.3333, 30, 3)).toEqual([0.333, 3.16, 30])
    expect(logSpaced(1, 1.004, 12)).toEqual([1])
  })

  it('reach from under to above what the rules ask for', () => {
    const rule = (max: number) => ({ k: { min: max / 2, max } }) as never
    expect(scanRange({ rules: [rule(4), rule(12), rule(0)] })).toEqual({ least: 1, most: 18 })
    expect(scanRange({ rules: [] })).toEqual({ least: 0.25, most: 4 })
  })
})

describe('what the charts of a scan show', () => {
  const returned = [{ returnId: 'r', number: 1, runSheet: 2, strength: 1.5, readsWithBreak: rate(20, 80), best: -6 }]

  it('is in per cent, with intervals, the returned samples apart', () => {
    const [chains, reads, machine] = breakSeries(scan(), returned)
    expect(chains!.points[0]).toEqual({ x: 1, y: 12, low: 10, high: 14.000000000000002 })
    expect(reads!.points[1]!.y).toBe(15)
    expect(machine).toMatchObject({ kind: 'points', marker: 'hollow', points: [{ x: 1.5, y: 25 }] })
    expect(breakSeries(scan(), [])).toHaveLength(2)
  })

  it('has energies within two standard errors', () => {
    const [mean, best, machine] = energySeries(scan(), returned)
    expect(mean!.points[0]).toEqual({ x: 1, y: -3, low: -3.5, high: -2.5 })
    expect(best!.points[0]).toEqual({ x: 1, y: -7 })
    expect(machine!.points).toEqual([{ x: 1.5, y: -6 }])
  })

  it('has a success probability only where the reference optimum is known', () => {
    expect(successSeries(scan())[0]!.points.map(({ y }) => y)).toEqual([3, 5])
    expect(successSeries(scan({ points: [point(1, null)] }))).toEqual([])
  })
})

it('says where the knee is, and when the scan ends too early', () => {
  expect(kneeText(scan())).toBe('From 2 on, stronger chains gain nothing that this scan can tell: the knee.')
  expect(kneeText(scan({ knee: { strength: 1, edge: 'weakest' } }))).toContain('Scan again from weaker ones')
  expect(kneeText(scan({ knee: { strength: 2, edge: 'strongest' } }))).toContain('Scan again with stronger ones')
  expect(kneeText(scan({ knee: null }))).toContain('Too few strengths')
  expect(kneeText(scan({ status: 'running' }))).toBe('2 strengths measured so far.')
})
