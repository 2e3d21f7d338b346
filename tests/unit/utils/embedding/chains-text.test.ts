import { describe, expect, it } from 'vitest'
import { readChainsText, writeChainsText } from '../../../../utils/embedding/chains-text'

describe('readChainsText', () => {
  it('reads what it wrote', () => {
    const chains = { '10': [3, 4], '2': [], 'a"b': [7] }
    expect(readChainsText(writeChainsText(chains))).toEqual({
      ok: true,
      chains,
      variables: 3,
      qubits: 3,
    })
  })

  it('takes chains that stand under “chains”', () => {
    expect(readChainsText('{"seed": 7, "chains": {"a": [1]}}')).toMatchObject({ ok: true, chains: { a: [1] } })
  })

  it.each(['[1, 2]', '3', '"a"', 'null'])('refuses %s, which is no object of chains', (text) => {
    expect(readChainsText(text).ok).toBe(false)
  })

  it('names every chain that is no list of qubit numbers', () => {
    const reading = readChainsText('{"a": [1], "b": 2, "c": [1.5], "d": [-1], "e": ["7"]}')
    expect(reading).toMatchObject({ ok: false })
    expect(reading.ok ? [] : reading.problems.map(({ path }) => path)).toEqual(['b', 'c', 'd', 'e'])
  })

  it('says that text is no JSON', () => {
    const reading = readChainsText('{"a": [1],\n "b": [2],\n}')
    expect(reading.ok ? [] : reading.problems).toHaveLength(1)
  })
})
