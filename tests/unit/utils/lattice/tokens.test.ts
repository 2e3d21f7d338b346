import { describe, expect, it } from 'vitest'
import { HUES } from '../../../../utils/hues'
import { mixColours, parseColour, readTokens } from '../../../../utils/lattice/tokens'

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
