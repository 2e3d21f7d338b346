import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { energyTableIssues } from '../../../../shared/engine/machine/energy-table'
import { formatEnergyTable, parseEnergyText } from '../../../../shared/engine/machine/energy-text'

const WANTED = { s: [0, 0.5, 1], A: [9, 1, 0], B: [0, 5.5, 12] }
const rejectedOf = (text: string) => parseEnergyText(text).rejected.map(({ line, message }) => `${line}: ${message}`)

describe('parseEnergyText', () => {
  it.each([
    ['comma', '0,9,0\n0.5,1,5.5\n1,0,12'],
    ['semicolon', '0;9;0\n0.5;1;5.5\n1;0;12'],
    ['tab', '0\t9\t0\r\n0.5\t1\t5.5\r\n1\t0\t12\r\n'],
    ['blanks', '  0 9   0\n 0.5  1 5.5\n1 0 12'],
    ['comments and empty lines', '# measured\n\n0,9,0 # start\n0.5,1,5.5\n1,0,12\n\n'],
    ['exponents and quotes', '"0","9e0","0"\n"5e-1","1","55E-1"\n"1","0","1.2e1"'],
  ])('reads columns apart by %s', (_, text) => {
    expect(parseEnergyText(text)).toEqual({ table: WANTED, rejected: [], notes: [] })
  })

  it('takes columns by the names of a header, with others beside them', () => {
    const text = 'B(s) (GHz), temperature, s, A(s) [GHz]\n0,7,0,9\n5.5,7,0.5,1\n12,7,1,0'
    expect(parseEnergyText(text)).toEqual({ table: WANTED, rejected: [], notes: [] })
    expect(parseEnergyText('s A (GHz) B (GHz)\n0 9 0\n0.5 1 5.5\n1 0 12').table).toEqual(WANTED)
  })

  it('says that GHz is taken where the header gives no unit', () => {
    expect(parseEnergyText('s,A,B\n0,9,0\n1,0,12').notes.join()).toContain('taken as GHz')
  })

  it('converts other units and says so', () => {
    const inMegahertz = parseEnergyText('s;A (MHz);B (THz)\n0;9000;0\n1;0;0.012')
    expect(inMegahertz.table).toEqual({ s: [0, 1], A: [9, 0], B: [0, 12] })
    expect(inMegahertz.notes).toHaveLength(2)
    expect(inMegahertz.notes[0]).toMatch(/^A converted from MHz to GHz/)
    // E = ħω: ω = 2π·10⁹ rad/s stands for 1 GHz.
    const angular = parseEnergyText(`s,A (rad/s),B (GHz)\n0,${2 * Math.PI * 1e9},0\n1,0,12`)
    expect(angular.table!.A[0]).toBeCloseTo(1, 12)
    // 1 K ≙ 20.8366 GHz and 1 µeV ≙ 0.241799 GHz (CODATA 2018).
    const others = parseEnergyText('s,A (K),B (ueV)\n0,1,0\n1,0,1')
    expect(others.table!.A[0]).toBeCloseTo(20.8366, 4)
    expect(others.table!.B[1]).toBeCloseTo(0.241799, 6)
  })

  it('refuses units and headers that it does not know', () => {
    expect(rejectedOf('s,A (furlong),B\n0,9,0\n1,0,12').join()).toMatch(/^1: A is in “furlong”/)
    expect(rejectedOf('s,A (MeV),B (GHz)\n0,9,0\n1,0,12').join()).toMatch(/^1: A is in “MeV”/)
    expect(rejectedOf('s,field,B\n0,9,0').join()).toMatch(/^1: the header names no column A/)
    expect(rejectedOf('s,A,A,B\n0,9,9,0').join()).toMatch(/two columns are called A/)
  })

  it('names each wrong line', () => {
    const text = [
      's,A (GHz),B (GHz)',
      '0.1,9,0',
      '0.2,x,1',
      '0.2,8,2,3',
      '0.15,8.5',
      '0.3,9.5,1',
      '0.4,-1,0.5',
      '0.9,0,12',
    ]
    expect(rejectedOf(text.join('\n'))).toEqual([
      '2: the first row must be s = 0, not 0.1',
      '3: A is “x”, which is not a number with a decimal point',
      '4: s = 0.2 does not rise from 0.2',
      '5: 2 of 3 columns; a row is s, A, B',
      '6: A rises from 8 to 9.5 GHz; it must fall',
      '6: B falls from 2 to 1 GHz; it must rise',
      '7: A = -1 GHz is outside 0 to 10000 GHz',
      '7: B falls from 1 to 0.5 GHz; it must rise',
      '8: A rises from -1 to 0 GHz; it must fall',
      '8: the last row must be s = 1, not 0.9',
    ])
    expect(parseEnergyText(text.join('\n')).table).toBeNull()
  })

  it('refuses decimal commas and columns without a name', () => {
    expect(rejectedOf('0;9,5;0\n1;0;12').join()).toContain('1: A is “9,5”')
    expect(rejectedOf('0,9,0,4\n1,0,12,4').join()).toContain('1: 4 columns')
  })

  it('holds nothing where there is no row, and stops at the most rows', () => {
    expect(parseEnergyText('')).toEqual({ table: null, rejected: [], notes: [] })
    const endless = Array.from({ length: 300_000 }, (_, k) => `${k / 300_000},0,0`).join('\n')
    expect(rejectedOf(endless)).toEqual(['2001: a table has at most 2000 rows'])
  })

  it('reads back what it writes, to the last bit', () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(
        fc.uniqueArray(share, { maxLength: 40 }),
        fc.array(share, { minLength: 42, maxLength: 42 }),
        (mids, steps) => {
          const s = [0, ...mids.filter((at) => at > 0 && at < 1).sort((a, b) => a - b), 1]
          const rising = s.map((_, k) => steps.slice(0, k + 1).reduce((sum, step) => sum + step, 0))
          const table = { s, A: [...rising].reverse(), B: rising }
          expect(energyTableIssues(table)).toEqual([])
          expect(parseEnergyText(formatEnergyTable(table))).toEqual({ table, rejected: [], notes: [] })
        },
      ),
    )
  })

  it('never fails on any text, and what it takes can be used', () => {
    const piece = fc.oneof(
      fc.constantFrom('s', 'A (GHz)', ',', ';', '\n', '\t', ' ', '0', '1', '.5', '-', '#', 'e9', '(', '"'),
      fc.string(),
    )
    fc.assert(
      fc.property(fc.array(piece), (pieces) => {
        const { table, rejected } = parseEnergyText(pieces.join(''))
        if (table) expect([energyTableIssues(table), rejected]).toEqual([[], []])
      }),
    )
  })
})
