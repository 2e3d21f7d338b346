import type { DefectPart } from '#shared/engine/machine/defect-edit'
import { parseDefectText } from '#shared/engine/machine/defects'
import type { LatticeArrays } from '~/composables/useMachines'
import { formatCount } from '../format'
import { couplerText } from './changes'
import type { ChangedParts } from './marks'

/** A defect list as typed, for asking whether a part is in it. */
export interface ListedDefects {
  readonly qubits: ReadonlySet<number>
  readonly couplers: ReadonlyMap<string, readonly [number, number]>
}

const keyOf = (a: number, b: number): string => (a < b ? `${a}-${b}` : `${b}-${a}`)

export function listedDefects(text: string): ListedDefects {
  const { qubits, couplers } = parseDefectText(text)
  return { qubits: new Set(qubits), couplers: new Map(couplers.map((pair) => [keyOf(...pair), pair])) }
}

export const isListed = ({ qubits, couplers }: ListedDefects, [a, b]: DefectPart): boolean =>
  b === undefined ? qubits.has(a) : couplers.has(keyOf(a, b))

/** `Qubit 17`, `Coupler 17–42`. */
export const partText = ([a, b]: DefectPart): string =>
  b === undefined ? `Qubit ${a}` : `Coupler ${couplerText([a, b])}`

/** `Listed: 14 qubits and 1 coupler.` */
export function listedText(text: string): string {
  const { qubits, couplers } = listedDefects(text)
  return `Listed: ${formatCount(qubits.size, 'qubit')} and ${formatCount(couplers.size, 'coupler')}.`
}

type Machine = Pick<LatticeArrays, 'ids' | 'usable' | 'ends' | 'missingCouplers' | 'couplersOfMissing'>

function holdsPair(pairs: Uint32Array, a: number, b: number): boolean {
  for (let k = 0; k < pairs.length; k += 2)
    if ((pairs[k] === a && pairs[k + 1] === b) || (pairs[k] === b && pairs[k + 1] === a)) return true
  return false
}

/** Whether the machine was made with a coupler between two qubits (dense indices), working or not. */
export const isCoupled = ({ ends, missingCouplers, couplersOfMissing }: Machine, a: number, b: number): boolean =>
  [ends, missingCouplers, couplersOfMissing].some((pairs) => holdsPair(pairs, a, b))

/** Why a part cannot be switched; null where it can. */
export function refusalOf(machine: Machine, listed: ListedDefects, part: DefectPart): string | null {
  const indices = part.map((id) => machine.ids.indexOf(id))
  const unknown = indices.indexOf(-1)
  if (unknown >= 0) return `This machine has no qubit ${part[unknown]}.`
  if (part.length === 1) return null
  if (!isCoupled(machine, indices[0]!, indices[1]!))
    return `There is no coupler between qubits ${part[0]} and ${part[1]}.`
  const gone = part.find((id) => listed.qubits.has(id))
  return gone === undefined ? null : `${partText(part)} is missing with qubit ${gone}; it needs no mention.`
}

/** What the list changes against the machine as it is; couplers of missing qubits go without saying. */
export function drawnChange({ ids, usable, missingCouplers }: Machine, listed: ListedDefects): ChangedParts {
  const works = ([a, b]: readonly [number, number]) => !listed.qubits.has(a) && !listed.qubits.has(b)
  const before = new Map<string, [number, number]>()
  for (let k = 0; k < missingCouplers.length; k += 2) {
    const pair: [number, number] = [ids[missingCouplers[k]!]!, ids[missingCouplers[k + 1]!]!]
    before.set(keyOf(...pair), pair)
  }
  const gone = new Set(Array.from(ids).filter((_, q) => !usable[q]))
  return {
    qubitsLost: [...listed.qubits].filter((id) => !gone.has(id)),
    qubitsRegained: [...gone].filter((id) => !listed.qubits.has(id)),
    couplersLost: [...listed.couplers]
      .filter(([key, pair]) => !before.has(key) && works(pair))
      .map(([, [a, b]]): [number, number] => [a, b]),
    couplersRegained: [...before]
      .filter(([key, pair]) => !listed.couplers.has(key) && works(pair))
      .map(([, pair]) => pair),
  }
}
