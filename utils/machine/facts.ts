import type { Family } from '#shared/engine/machine/fabric'
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

/** `Pegasus, trimmed`. */
export function familyTitle(family: Family): string | undefined {
  if (family.kind === 'custom') return `from ${family.file}`
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
