import { csvCell } from '../../shared/csv'
import { straightSchedule } from '../../shared/engine/programming/schedule'
import { gaugesCsv } from './gauges-text'
import type { BundleInput } from './input'
import { programmedCsv, programmedMtx, programmedValues } from './programmed-texts'
import { readMe } from './read-me'

const json = (value: unknown): string => `${JSON.stringify(value, null, 2)}\n`
/** Long lists a line each, without the line a number that indented JSON takes. */
const jsonLines = (items: readonly unknown[]): string =>
  `[\n${items.map((item) => JSON.stringify(item)).join(',\n')}\n]`

function mapBackCsv({ labels, chains }: BundleInput): string {
  const lines = labels.flatMap((label, i) => chains[i]!.map((qubit) => `${csvCell(label)},${qubit}\n`))
  return `variable,qubit\n${lines.join('')}`
}

const mapBackJson = ({ labels, chains }: BundleInput): string =>
  `${jsonLines(labels.map((variable, i) => ({ variable, qubits: chains[i]! })))}\n`

/** Lists rather than keys, so that no label has to be a key. */
function logicalJson({ labels, ising }: BundleInput): string {
  const h = labels.map((label, i) => [label, ising.linear[i]!])
  const J = Array.from(ising.values, (value, k) => [labels[ising.rows[k]!]!, labels[ising.cols[k]!]!, value])
  return `{"offset": ${JSON.stringify(ising.offset)},\n"h": ${jsonLines(h)},\n"J": ${jsonLines(J)}}\n`
}

function scheduleCsv({ sheet: { settings } }: BundleInput): string {
  const points = settings.schedule ?? straightSchedule(settings.annealMicroseconds)
  return `microseconds,s\n${points.map(({ microseconds, s }) => `${microseconds},${s}\n`).join('')}`
}

function runSheetJson({ sheet, problem, embedding, machine, fingerprints, estimate }: BundleInput): string {
  const { ranges, controlError, timing, temperatureMillikelvin, price } = machine.sheet
  const { name, family, calibration } = machine
  return json({
    runSheet: `RS-${sheet.number}`,
    name: sheet.name,
    problem: { number: `P-${problem.number}`, version: problem.version, sense: problem.sense },
    embedding: `E-${embedding.number}`,
    settings: sheet.settings,
    machine: { name, family, calibration, ranges, controlError, timing, temperatureMillikelvin, price },
    estimate,
    fingerprints,
  })
}

/** The files of a bundle but for their checksums, by name: a pure function, byte for byte. */
export function bundleFiles(input: BundleInput): Map<string, string> {
  const values = programmedValues(input.programmed, input.qubitIds, input.labels)
  return new Map([
    ['README.txt', readMe(input)],
    ['gauges.csv', gaugesCsv(input)],
    ['logical.json', logicalJson(input)],
    ['map-back.csv', mapBackCsv(input)],
    ['map-back.json', mapBackJson(input)],
    ['problem.csv', programmedCsv(values)],
    ['problem.json', `${JSON.stringify(values)}\n`],
    ['problem.mtx', programmedMtx(values)],
    ['run-sheet.json', runSheetJson(input)],
    ['schedule.csv', scheduleCsv(input)],
  ])
}
