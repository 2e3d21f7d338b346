import { describe, expect, it } from 'vitest'
import { lowerAll } from '../../../../../shared/engine/readout/advice/lower-all'
import { raiseAll } from '../../../../../shared/engine/readout/advice/raise-all'
import { raiseNamed } from '../../../../../shared/engine/readout/advice/raise-named'
import { reEmbed } from '../../../../../shared/engine/readout/advice/re-embed'
import { chains, chainsWith, quiet } from './evidence'

describe('raiseNamed', () => {
  const weak = { 7: { strength: 0.6, breaks: 400 } }

  it('names the chain under its bound that breaks more often than the others', () => {
    const [item] = raiseNamed({ ...quiet, chains: chainsWith(weak) })
    expect(item).toMatchObject({
      kind: 'raise-named',
      action: { set: 'strength of chains', variables: [7], margin: 1.05 },
    })
    expect(item!.sentence).toContain('x7')
    expect(item!.evidence).toMatchObject([
      { name: 'reads in which x7 broke', value: 0.4, unit: 'share' },
      { name: 'k of x7 as a share of its bound', value: expect.closeTo(0.4, 12) },
      { name: 'other chains, reads in which one broke', value: 0.002 },
    ])
  })

  it('puts the worst of several first', () => {
    const two = chainsWith({ ...weak, 3: { strength: 1, breaks: 500 } })
    expect(raiseNamed({ ...quiet, chains: two })[0]!.action).toMatchObject({ variables: [3, 7] })
  })

  it('is silent where the chain is held above its bound, breaks like the others, or hardly ever', () => {
    expect(raiseNamed({ ...quiet, chains: chainsWith({ 7: { breaks: 400 } }) })).toEqual([])
    expect(raiseNamed({ ...quiet, chains: chainsWith({ 7: { strength: 0.6, breaks: 4 } }) })).toEqual([])
    const alike = chains.map((chain) => ({ ...chain, breaks: 300, strength: 1 }))
    expect(raiseNamed({ ...quiet, chains: alike })).toEqual([])
  })
})

describe('raiseAll', () => {
  it('raises all to the median of what those under their bound need', () => {
    const broken = chains.map((chain, i) => ({ ...chain, breaks: 200, strength: i < 3 ? 1 : 2 }))
    expect(raiseAll({ ...quiet, chains: broken })[0]!.action).toEqual({ set: 'strength of all', factor: 1.5 })
    const high = chains.map((chain) => ({ ...chain, breaks: 200 }))
    expect(raiseAll({ ...quiet, chains: high })[0]!.action).toEqual({ set: 'strength of all', factor: 1.25 })
    const far = chains.map((chain) => ({ ...chain, breaks: 200, strength: 0.3 }))
    expect(raiseAll({ ...quiet, chains: far })[0]!.action).toEqual({ set: 'strength of all', factor: 2 })
  })

  it('is silent where few break, or those only that are advised on by name', () => {
    expect(raiseAll(quiet)).toEqual([])
    const weak = Object.fromEntries([0, 1, 2].map((i) => [i, { strength: 0.5, breaks: 900 }]))
    expect(raiseAll({ ...quiet, chains: chainsWith(weak) })).toEqual([])
    expect(raiseAll({ ...quiet, chains: [] })).toEqual([])
  })
})

describe('lowerAll', () => {
  const cramped = { ...quiet, precision: { ...quiet.precision, underTwoSigma: 6 } }

  it('goes down to the bounds, by a fifth where they leave less room', () => {
    const [item] = lowerAll({ ...cramped, chains: chains.map((chain) => ({ ...chain, bound: 1.3 })) })
    expect(item!.action).toMatchObject({ set: 'strength of all' })
    expect((item!.action as { factor: number }).factor).toBeCloseTo(0.6825, 10)
    expect(lowerAll(cramped)[0]!.action).toMatchObject({ factor: expect.closeTo(0.7875, 10) })
    const tight = chains.map((chain) => ({ ...chain, bound: 2.5 }))
    expect(lowerAll({ ...cramped, chains: tight })[0]!.action).toMatchObject({ factor: 0.8 })
    const loose = chains.map((chain) => ({ ...chain, bound: 0.1 }))
    expect(lowerAll({ ...cramped, chains: loose })[0]!.action).toMatchObject({ factor: 0.5 })
  })

  it('fires for a blur above the smallest coefficient too', () => {
    expect(lowerAll({ ...quiet, precision: { ...quiet.precision, blur: 0.6 } })).toHaveLength(1)
  })

  it('is silent where chains break, precision is no matter, or something else limits the scale', () => {
    expect(lowerAll(quiet)).toEqual([])
    expect(lowerAll({ ...cramped, chains: chains.map((chain) => ({ ...chain, breaks: 5 })) })).toEqual([])
    expect(lowerAll({ ...cramped, scale: { ...quiet.scale, isLimitedByChains: false } })).toEqual([])
    expect(lowerAll({ ...cramped, precision: { ...cramped.precision, isKnown: false } })).toEqual([])
  })
})

describe('reEmbed', () => {
  it('names long chains that break although they are held', () => {
    const [item] = reEmbed({ ...quiet, chains: chainsWith({ 4: { length: 8, breaks: 90 } }) })
    expect(item).toMatchObject({ kind: 're-embed', action: { look: 'embedding', variables: [4] } })
  })

  it('is silent where strength explains it, the chain is hardly longer, or it holds', () => {
    expect(reEmbed({ ...quiet, chains: chainsWith({ 4: { length: 8, breaks: 90, strength: 1 } }) })).toEqual([])
    expect(reEmbed({ ...quiet, chains: chainsWith({ 4: { length: 4, breaks: 90 } }) })).toEqual([])
    expect(reEmbed({ ...quiet, chains: chainsWith({ 4: { length: 8 } }) })).toEqual([])
    expect(reEmbed({ ...quiet, chains: [] })).toEqual([])
  })
})
