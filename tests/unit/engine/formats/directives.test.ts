import { describe, expect, it } from 'vitest'
import {
  readDirective,
  resolveSettings,
  writeDirectives,
  type Directives,
} from '../../../../shared/engine/formats/directives'

describe('readDirective', () => {
  it('reads what a file says about itself', () => {
    const said: Directives = {}
    for (const comment of [
      ' form: Ising',
      'OFFSET:3.5',
      ' sense : max',
      'convention: minus',
      ' layout: list',
      ' variable order: listed',
    ])
      expect(readDirective(comment, said)).toBeNull()
    expect(said).toEqual({
      form: 'ising',
      offset: 3.5,
      sense: 'max',
      convention: 'minus',
      layout: 'list',
      'variable order': 'listed',
    })
  })

  it('passes over ordinary comments', () => {
    const said: Directives = {}
    for (const comment of ['', ' berths', ' source: harbour office', ' constructor: x', ' __proto__: y'])
      expect(readDirective(comment, said)).toBeNull()
    expect(said).toEqual({})
  })

  it('says what is wrong', () => {
    const said: Directives = { offset: 1, form: 'qubo' }
    expect(readDirective('form: spin', said)).toBe('form must be qubo or ising, not "spin"')
    expect(readDirective('offset: 0x1', {})).toBe('offset: the value "0x1" is not a decimal number')
    expect(readDirective('offset: 2', said)).toBe('offset was given before as 1')
    expect(readDirective('offset: 1.0', said)).toBeNull()
    expect(said).toEqual({ offset: 1, form: 'qubo' })
  })

  it('reads back what it writes', () => {
    const said: Directives = { layout: 'matrix', form: 'ising', sense: 'max', offset: -0.1, 'variable order': 'listed' }
    const again: Directives = {}
    for (const line of writeDirectives(said)) expect(readDirective(line.slice(1), again)).toBeNull()
    expect(again).toEqual(said)
  })
})

describe('resolveSettings', () => {
  it('lets options beat the file, and the file beat the defaults', () => {
    expect(resolveSettings({}, {}).settings).toEqual({
      form: 'qubo',
      formSource: 'default',
      convention: 'plus',
      sense: 'min',
      offset: 0,
    })
    const said: Directives = { form: 'ising', convention: 'minus', sense: 'max', offset: 2 }
    expect(resolveSettings({}, said).settings).toMatchObject({ ...said, formSource: 'file' })
    expect(resolveSettings({ form: 'qubo', convention: 'plus', sense: 'min' }, said)).toEqual({
      settings: { form: 'qubo', formSource: 'given', convention: 'plus', sense: 'min', offset: 2 },
      issues: [],
    })
  })

  it('knows the minus convention for Ising forms only', () => {
    expect(resolveSettings({ convention: 'minus' }, {}).issues).toHaveLength(1)
    expect(resolveSettings({ convention: 'minus' }, { form: 'ising' }).issues).toEqual([])
  })
})
