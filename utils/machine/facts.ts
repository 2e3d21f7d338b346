import type { Family, PublishedFamily } from '#shared/engine/machine/fabric'
import { parseDefectText } from '#shared/engine/machine/defects'
import type { MachineView } from '#shared/schemas/machines'
import type { Fact } from '../ui/parts'
import { formatCount, formatNumber } from '../format'
import { familyTextOf } from './family'

/** `±4` for a range that is even about nought, else `−2 to 1`. */
export const rangeText = ([low, high]: readonly [number, number]): string =>
  low === -high ? `±${formatNumber(high)}` : `${formatNumber(low)} to ${formatNumber(high)}`

/** A control error to three places, `0.020`; smaller ones to their digits. */
export const sigmaText = (sigma: number): string =>
  sigma === 0 || sigma < 0.001 ? formatNumber(sigma) : formatNumber(sigma, { decimals: 3 })

/** A file name for a narrow place: its ending stays. */
const shortened = (name: string): string => (name.length > 24 ? `${name.slice(0, 13)}…${name.slice(-10)}` : name)

/** `Pegasus, trimmed`; `from lab.csv` of a graph of no family. */
export function familyTitle(family: Family): string | undefined {
  if (family.kind === 'custom') return `from ${shortened(family.file)}`
  const { title } = familyTextOf(family.kind)
  if (family.kind === 'pegasus') return `${title}, ${family.trimmed ? 'trimmed' : 'untrimmed'}`
  // The names of the other lattices say all of it: `square grid 20×30`.
  return family.kind === 'chimera' || family.kind === 'zephyr' ? title : undefined
}

/** The strip under the title of a machine. */
export function machineFacts(machine: MachineView): Fact[] {
  const { ranges, defects, temperatureMillikelvin } = machine.sheet
  const missing = new Set(defects.qubits).size
  const rangeHelp = (what: 'h' | 'J' | 'coupling sum', text: string): Pick<Fact, 'help' | 'name'> => ({
    help: { id: 'range', given: { what, text, calibration: machine.shown } },
    name: `the range of ${what}`,
  })
  return [
    { label: 'Graph', value: machine.family, note: familyTitle(machine.familySizes) },
    {
      label: 'Qubits',
      value: formatNumber(machine.qubits),
      note: `of ${formatNumber(machine.qubitsMade)}`,
      help: { id: 'workingQubits', given: { family: machine.familySizes, missing } },
      name: 'the number of working qubits',
    },
    {
      label: 'Couplers',
      value: formatNumber(machine.couplers),
      note: `of ${formatNumber(machine.couplersMade)}`,
      help: { id: 'workingCouplers', given: { made: machine.couplersMade, working: machine.couplers } },
      name: 'the number of working couplers',
    },
    {
      label: 'Highest degree',
      value: formatNumber(machine.maxDegree),
      help: {
        id: 'machineDegree',
        given: { degree: machine.maxDegree, qubits: machine.qubits, couplers: machine.couplers },
      },
    },
    { label: 'h', value: rangeText(ranges.h), ...rangeHelp('h', rangeText(ranges.h)) },
    { label: 'J', value: rangeText(ranges.J), ...rangeHelp('J', rangeText(ranges.J)) },
    ranges.couplingSum
      ? {
          label: 'Coupling sum',
          value: rangeText(ranges.couplingSum),
          note: 'per qubit',
          ...rangeHelp('coupling sum', rangeText(ranges.couplingSum)),
        }
      : { label: 'Coupling sum', value: 'not limited', word: true },
    temperatureMillikelvin === null
      ? { label: 'Temperature', value: 'not measured', word: true }
      : { label: 'Temperature', value: formatNumber(temperatureMillikelvin, { significant: 4 }), unit: 'mK' },
  ]
}

/** How many qubits are missing, and how many of them are new. */
export function latticeNote({ qubits, qubitsMade, changes }: MachineView): string {
  const missing = qubitsMade - qubits
  const all = missing === 0 ? 'no qubit missing' : `${formatCount(missing, 'qubit')} missing`
  return changes?.qubitsLost.length ? `${all}, ${changes.qubitsLost.length} of them new` : all
}

/** The graph that a new machine is going to have; family is null where it comes from a file. */
export interface ChosenGraph {
  name: string
  qubits: number
  couplers: number
  family: PublishedFamily | null
}

/** The strip under the title of a machine that is being added. */
export function newMachineFacts(chosen: ChosenGraph | null, defects: string): Fact[] {
  const family = chosen?.family ?? null
  const missing = parseDefectText(defects)
  return [
    { label: 'Graph', value: chosen?.name ?? '–', note: family ? familyTitle(family) : undefined },
    {
      label: 'Qubits in all',
      value: formatNumber(chosen?.qubits),
      help: family ? { id: 'qubitsMade', given: { family } } : undefined,
      name: 'the number of qubits made',
    },
    {
      label: 'Couplers in all',
      value: formatNumber(chosen?.couplers),
      help: chosen && family ? { id: 'couplersMade', given: { family, couplers: chosen.couplers } } : undefined,
      name: 'the number of couplers made',
    },
    { label: 'Missing qubits', value: formatNumber(new Set(missing.qubits).size) },
    { label: 'Missing couplers', value: formatNumber(missing.couplers.length), note: 'beside those of missing qubits' },
  ]
}
