import type { EnergyCause, EnergyMeaning } from '#shared/engine/readout/energy-agreement'
import type { ReturnView } from '#shared/schemas/returns'

type Made = ReturnView['made'][string] | undefined

const MEANINGS: Record<EnergyMeaning, string> = {
  programmed: 'energies in programmed units',
  'programmed with offset': 'energies in programmed units, the offset included',
  problem: 'energies in the problem’s units',
  'problem, maximised': 'values in the problem’s units and sense',
}

const CAUSES: Record<EnergyCause, string> = {
  'spins or fields reversed':
    'They are those of the reversed spins: up and down may be exchanged in the file, or the fields were programmed with the other sign.',
  'energy negated': 'They have the other sign throughout: the client may write E = −Σhs − ΣJss.',
  'couplings reversed': 'They fit couplings of the other sign: the client may take J > 0 as ferromagnetic.',
  'gauge not undone': 'They fit once the gauges are undone: upload the file again with gauges “as read”.',
  'gauge undone twice':
    'They fit the rows as they were before a gauge was undone: it may have been undone twice, or not at all. Try the other choice of gauges.',
  'constant offset': 'They are all off by the same amount: the client may leave a constant out.',
  unknown:
    'No sign convention or gauge explains it: another calibration or other settings may have been programmed, or rows and energies do not belong together.',
}

const known = <T extends string>(words: Record<T, string>, key: Made): string | null =>
  typeof key === 'string' && Object.hasOwn(words, key) ? words[key as T] : null

/** What the file's own energies are, where they agree with the programmed values. */
export const energiesMeaningWords = (key: Made): string | null => known(MEANINGS, key)

/** What would explain that they do not. */
export const energiesCauseWords = (key: Made): string | null => known(CAUSES, key)
