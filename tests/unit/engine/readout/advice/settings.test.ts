import { describe, expect, it } from 'vitest'
import { moreGauges } from '../../../../../shared/engine/readout/advice/gauges'
import { moreReads } from '../../../../../shared/engine/readout/advice/more-reads'
import { pauseAdvice } from '../../../../../shared/engine/readout/advice/pause'
import { strongPenalties, weakPenalties } from '../../../../../shared/engine/readout/advice/penalties'
import { precisionAdvice } from '../../../../../shared/engine/readout/advice/precision'
import { scaleAdvice } from '../../../../../shared/engine/readout/advice/scale'
import { suspectParts } from '../../../../../shared/engine/readout/advice/suspects'
import { quiet } from './evidence'

describe('moreGauges', () => {
  const differing = [{ of: 'energies', adjusted: 0.001 }]

  it('doubles gauges that differ', () => {
    expect(moreGauges({ ...quiet, gaugeTests: differing })[0]!.action).toEqual({ set: 'gauges', to: 20 })
  })

  it('asks for ten where all reads rest on one', () => {
    const one = { ...quiet, asked: { reads: 1000, gauges: 1 }, gaugeTests: [] }
    expect(moreGauges(one)[0]!.action).toEqual({ set: 'gauges', to: 10 })
    expect(moreGauges({ ...one, reads: 99 })).toEqual([])
    expect(moreGauges({ ...one, precision: { ...quiet.precision, isKnown: false } })).toEqual([])
  })

  it('leaves each gauge ten reads, and is silent where that leaves no more of them', () => {
    expect(moreGauges({ ...quiet, gaugeTests: differing, asked: { reads: 150, gauges: 10 } })[0]!.action).toEqual({
      set: 'gauges',
      to: 15,
    })
    expect(moreGauges({ ...quiet, gaugeTests: differing, asked: { reads: 100, gauges: 10 } })).toEqual([])
    expect(moreGauges(quiet)).toEqual([])
  })
})

describe('moreReads', () => {
  it('asks for what the low end of the interval of p needs', () => {
    // Wilson's interval of 2 in 1,000 begins at 0.000549; ln 0.01 / ln(1 − 0.000549) = 8,392.
    const [item] = moreReads({ ...quiet, success: { target: 'reference', successes: 2, trials: 1000 } })
    expect(item!.action).toEqual({ set: 'reads', to: 8400 })
    expect(item!.sentence).toContain('the reference')
  })

  it('asks for what the high end needs, at least, where no read succeeded', () => {
    // 3.8415/(1000 + 3.8415) = 0.0038268; ln 0.01 / ln(1 − 0.0038268) = 1,201.1.
    const [item] = moreReads({ ...quiet, success: { target: 'reference', successes: 0, trials: 1000 } })
    expect(item!.action).toEqual({ set: 'reads', to: 1300 })
  })

  it('is silent where the reads are enough, or nothing is known', () => {
    expect(moreReads(quiet)).toEqual([])
    expect(moreReads({ ...quiet, success: null })).toEqual([])
  })
})

describe('precisionAdvice', () => {
  const precision = { ...quiet.precision, underTwoSigma: 4 }

  it('puts each interaction on one coupler where that lessens the blur', () => {
    const helped = { ...quiet, precision: { ...precision, blurWithOneCoupler: 0.15 } }
    expect(precisionAdvice(helped)[0]!.action).toEqual({ set: 'interaction couplers', to: 'one' })
  })

  it('points at the coefficients where it does not', () => {
    expect(precisionAdvice({ ...quiet, precision })[0]!.action).toEqual({ look: 'coefficients' })
    const hardly = { ...quiet, precision: { ...precision, blurWithOneCoupler: 0.199 } }
    expect(precisionAdvice(hardly)[0]!.action).toEqual({ look: 'coefficients' })
  })

  it('is silent without coefficients under 2σ, or without a known σ', () => {
    expect(precisionAdvice(quiet)).toEqual([])
    expect(precisionAdvice({ ...quiet, precision: { ...precision, isKnown: false } })).toEqual([])
  })
})

describe('penalties', () => {
  const group = { name: 'row 1', isBrokenInBest: true, violations: 300, weight: 2, sufficient: 5 }

  it('calls a penalty weak that the best answer breaks', () => {
    const [item] = weakPenalties({ ...quiet, groups: [group] })
    expect(item!.action).toEqual({ look: 'groups', groups: ['row 1'] })
    expect(item!.evidence).toMatchObject([{ value: 0.3 }, { value: 2 }, { value: 5 }])
    expect(weakPenalties({ ...quiet, groups: [{ ...group, weight: null, sufficient: null }] })).toHaveLength(1)
  })

  it('does not blame a penalty that is proved enough, nor one that holds', () => {
    expect(weakPenalties({ ...quiet, groups: [{ ...group, weight: 6 }] })).toEqual([])
    expect(weakPenalties({ ...quiet, groups: [{ ...group, isBrokenInBest: false }] })).toEqual([])
  })

  it('calls a penalty strong that takes the range while no read breaks a group', () => {
    const held = { ...group, isBrokenInBest: false, violations: 0, weight: 16 }
    const strong = { ...quiet, groups: [held], largest: { withinGroups: 32, elsewhere: 2 } }
    expect(strongPenalties(strong)[0]!.action).toEqual({ look: 'groups', groups: ['row 1'] })
    expect(strongPenalties({ ...strong, groups: [{ ...held, violations: 1 }] })).toEqual([])
    expect(strongPenalties({ ...strong, groups: [{ ...held, weight: 15 }] })).toEqual([])
    expect(strongPenalties({ ...strong, largest: { withinGroups: 6, elsewhere: 2 } })).toEqual([])
    expect(strongPenalties(quiet)).toEqual([])
  })
})

describe('pauseAdvice', () => {
  it('pauses at the place of the spectrum, and is silent without one', () => {
    const [item] = pauseAdvice({ ...quiet, pause: { s: 0.51234, gap: 0.1, gapAt: 0.4, kT: 0.3 } })
    expect(item!.action).toEqual({ set: 'pause', s: 0.51234 })
    expect(item!.sentence).toContain('s = 0.512')
    expect(pauseAdvice(quiet)).toEqual([])
  })
})

describe('scaleAdvice', () => {
  const warm = {
    ...quiet,
    scale: { ...quiet.scale, isChosen: true, value: 0.25 },
    temperature: { value: 0.6, interval: { low: 0.55, high: 0.65 }, fallAtGreatest: 1, standardError: 0.1 },
  }

  it('takes the greatest scale where samples are warm and a lesser one was chosen', () => {
    expect(scaleAdvice(warm)[0]!.action).toEqual({ set: 'scale', to: 'fit' })
  })

  it('is silent where the scale is fitted, the fall is not seen, or no temperature is known', () => {
    expect(scaleAdvice({ ...warm, scale: { ...warm.scale, isChosen: false } })).toEqual([])
    expect(scaleAdvice({ ...warm, scale: { ...warm.scale, greatest: 0.25 } })).toEqual([])
    expect(scaleAdvice({ ...warm, temperature: { ...warm.temperature, fallAtGreatest: 0.2 } })).toEqual([])
    expect(scaleAdvice({ ...warm, temperature: null })).toEqual([])
  })
})

describe('suspectParts', () => {
  it('names suspected parts in use, and is silent without any', () => {
    const [item] = suspectParts({ ...quiet, suspects: { qubits: [9], couplers: [[3, 4]] } })
    expect(item!.action).toEqual({ look: 'machine', qubits: [9], couplers: [[3, 4]] })
    expect(item!.sentence).toContain('coupler 3–4 and qubit 9')
    expect(suspectParts(quiet)).toEqual([])
  })
})
