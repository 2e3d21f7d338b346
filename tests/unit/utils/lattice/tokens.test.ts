import { describe, expect, it } from 'vitest'
import { HUES } from '../../../../utils/hues'
import { calmed, contrastOf, mixColours, parseColour, readTokens } from '../../../../utils/lattice/tokens'

describe('tokens', () => {
  it('reads colours however the theme writes them', () => {
    expect(parseColour(' #FBFAF6 ')).toBe('#fbfaf6')
    expect(parseColour('#abc')).toBe('#aabbcc')
    expect(parseColour('22 28 25')).toBe('#161c19')
    expect(parseColour('rgb(22, 28, 25)')).toBe('#161c19')
    expect(parseColour('rgb(22 28 25 / 0.5)')).toBe('#161c19')
    expect(parseColour('')).toBeNull()
    expect(parseColour('300 1 1')).toBeNull()
  })

  it('falls back to the light theme and knows the dark one by its paper', () => {
    const light = readTokens(() => '')
    expect(light.isDark).toBe(false)
    expect(light.hues).toEqual(HUES.map((hue) => hue.light))
    const dark = readTokens((property) => (property === '--paper' ? '#161c19' : ''))
    expect(dark.isDark).toBe(true)
    expect(dark.hues[1]).toBe('#8CAFFE')
  })

  it('mixes colours', () => {
    expect(mixColours('#000000', '#ffffff', 0.5)).toBe('#808080')
    expect(mixColours('#123456', '#ffffff', 0)).toBe('#123456')
  })
})

describe('calm tokens', () => {
  it('measures contrast as WCAG does', () => {
    // WCAG 2.2, relative luminance: black on white is 21; #777777 on white is 4.48 (WebAIM's checker).
    expect(contrastOf('#000000', '#ffffff')).toBeCloseTo(21, 6)
    expect(contrastOf('#777777', '#ffffff')).toBeCloseTo(4.48, 2)
  })

  it('leave the usual themes as they are, and let rules and hairlines of high contrast step back', () => {
    const light = readTokens(() => '')
    expect(calmed(light)).toEqual(light)
    const strong = { ...light, paper: '#ffffff', rule: '#6f7873', hair: '#8c948f' }
    const calm = calmed(strong)
    expect(contrastOf(calm.rule, '#ffffff')).toBeCloseTo(2, 1)
    expect(contrastOf(calm.hair, '#ffffff')).toBeCloseTo(1.6, 1)
    expect({ ...calm, rule: '', hair: '' }).toEqual({ ...strong, rule: '', hair: '' })
    expect(contrastOf(calmed({ ...strong, paper: '#000000' }).rule, '#000000')).toBeLessThanOrEqual(2)
  })
})
