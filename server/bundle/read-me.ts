import { oneLine } from '../mail/letter'
import type { BundleInput } from './input'
import { workedCheck } from './worked-check'

const counted = (count: number, one: string): string => `${count} ${one}${count === 1 ? '' : 's'}`

const FILES = `FILES
  problem.json     programmed h and J by qubit number, scale, offset, chain strengths
  problem.csv      the same as lines a,b,value: a = b for a field, else a coupling
  problem.mtx      the same in Matrix Market: row and column are qubit number + 1
  map-back.csv     variable,qubit: one line for each qubit of each chain
  map-back.json    the same as a list of chains
  logical.json     the problem before it was embedded: Ising form, to be minimised
  gauges.csv       one line a gauge: its number, its reads, and a sign for every qubit,
                   in ascending order of qubit numbers, without anything between them
  schedule.csv     s over time in microseconds: straight pieces between these points
  run-sheet.json   settings, machine with ranges and calibration, time estimate, fingerprints
  SHA256SUMS       checksums of all the others: sha256sum -c SHA256SUMS`

const RUN = `TO RUN IT
  1. For each gauge with signs t: programme h'(q) = t(q) h(q) and J'(a,b) = t(a) t(b) J(a,b).
  2. Make the gauge's reads along the schedule.
  3. Undo the gauge in every read: s(q) = t(q) s'(q).
  4. Write all reads into one CSV file. Its header names the qubits, in any order, and may
     have the columns gauge, count and energy beside them; a line is one read, or one distinct
     read with its count. Spins are all 1 and -1, or all 1 and 0:`

const FORMULAS = `FORMULAS
  s is +1 or -1. Sums run over the entries of the files.
  E_logical(s)  = sum h(i) s(i) + sum J(i,j) s(i) s(j) + offset      of logical.json
  E_physical(s) = sum h(q) s(q) + sum J(a,b) s(a) s(b)               of problem.json
  On every state whose chains are unbroken, that is, in which all qubits of a variable agree:
  scale * E_logical = E_physical + offset, with scale and offset of problem.json.
  A gauge changes no energy: E' with h', J' at s' = t s is E with h, J at s.
  Majority decoding: a variable is +1 where more of its qubits are +1 than -1.`

function opening({ sheet, problem, embedding, machine }: BundleInput): string {
  const { gauges, reads } = sheet.settings
  const title = `RS-${sheet.number}, ${oneLine(sheet.name)}`
  const sense =
    problem.sense === 'max' ? '\nThe problem is maximised: its value is the negative of the energies here.' : ''
  return `${title}
${'='.repeat([...title].length)}

P-${problem.number}, version ${problem.version}, in embedding E-${embedding.number} on machine ${oneLine(machine.name)} at calibration ${machine.calibration}.
${counted(reads, 'read')} in ${counted(gauges, 'gauge')}. Approved: nothing in here changes any more.${sense}`
}

/** The first columns and a read of the CSV file that is to come back. */
function sampleLines({ qubitIds }: BundleInput): string {
  const some = qubitIds.slice(0, 4)
  const more = qubitIds.length > some.length ? ',...' : ''
  return `       ${some.join(',')}${more},gauge
       ${some.map((_, k) => (k % 2 === 0 ? '1' : '-1')).join(',')}${more},0
  5. Load the file on the page of the run sheet, under Rehearsal and samples.`
}

/** The plain read-me of a bundle, with the formulas to check it by and one check worked out in its own numbers. */
export const readMe = (input: BundleInput): string =>
  [
    opening(input),
    FILES,
    `${RUN}\n${sampleLines(input)}`,
    FORMULAS,
    `A CHECK, WORKED OUT (to 12 digits)\n${workedCheck(input)
      .map((line) => `  ${line}`)
      .join('\n')}`,
  ].join('\n\n') + '\n'
