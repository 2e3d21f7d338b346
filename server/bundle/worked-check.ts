import type { Problem } from '../../shared/engine/problem/problem'
import type { Programmed } from '../../shared/engine/programming/programme'
import { gaugeOf } from './gauges-text'
import type { BundleInput } from './input'

const DIGITS = 12
const shown = (value: number): string => String(Number(value.toPrecision(DIGITS)))
const signed = (sign: number): string => (sign > 0 ? '+1' : '-1')

function logicalEnergy({ n, linear, rows, cols, values, offset }: Problem, spin: (i: number) => number): number {
  let energy = offset
  for (let i = 0; i < n; i++) energy += linear[i]! * spin(i)
  values.forEach((J, k) => (energy += J * spin(rows[k]!) * spin(cols[k]!)))
  return energy
}

function physicalEnergy({ h, J, ends, chainOf }: Programmed, spin: (i: number) => number): number {
  let energy = 0
  h.forEach((field, p) => (energy += field * spin(chainOf[p]!)))
  J.forEach((value, c) => (energy += value * spin(chainOf[ends[2 * c]!]!) * spin(chainOf[ends[2 * c + 1]!]!)))
  return energy
}

function energyCheck({ labels, ising, programmed }: BundleInput): string[] {
  const spin = (i: number): number => (i === 0 ? -1 : 1)
  const [logical, physical] = [logicalEnergy(ising, spin), physicalEnergy(programmed, spin)]
  const { scale, offset } = programmed
  return [
    `Energy. Variable ${JSON.stringify(labels[0])} at -1, every other at +1, each qubit as its variable:`,
    `  E_logical  = ${shown(logical)}   from logical.json, offset included`,
    `  E_physical = ${shown(physical)}   from problem.json`,
    `  scale * E_logical   = ${shown(scale * logical)}`,
    `  E_physical + offset = ${shown(physical + offset)}`,
  ]
}

function gaugeCheck(input: BundleInput): string[] {
  const { programmed, qubitIds, sheet } = input
  if (programmed.J.length === 0) return []
  const number = sheet.settings.gauges - 1
  const signs = gaugeOf(input, number)
  const [a, b] = [programmed.ends[0]!, programmed.ends[1]!]
  const J = programmed.J[0]!
  return [
    `Gauge. In gauge ${number} qubits ${qubitIds[a]} and ${qubitIds[b]} have the signs ${signed(signs[a]!)} and ${signed(signs[b]!)}, so their J`,
    `  of ${J} is programmed as ${J * signs[a]! * signs[b]!}; a value of -1 read at qubit ${qubitIds[a]} is handed back as ${signed(-signs[a]!)}.`,
  ]
}

/** The longest chain, its qubits at +1 and -1 in turn. */
function majorityCheck({ labels, chains }: BundleInput): string[] {
  const longest = chains.reduce((most, chain, i) => (chain.length > chains[most]!.length ? i : most), 0)
  const { length } = chains[longest]!
  const name = JSON.stringify(labels[longest])
  if (length === 1) return [`Majority. Every chain has one qubit: a variable is read as its qubit.`]
  return [
    `Majority. Should the ${length} qubits of ${name} read +1, -1 in turn, the chain is broken and their sum is ${length % 2}:`,
    length % 2 === 1
      ? `  ${name} is decoded as +1.`
      : '  a tie, which Espalier settles by a coin drawn from the seed of the run sheet, and counts.',
  ]
}

/** Numbers of this very run sheet by which a reader can tell whether the formulas were understood. */
export const workedCheck = (input: BundleInput): string[] => [
  ...energyCheck(input),
  ...gaugeCheck(input),
  ...majorityCheck(input),
]
