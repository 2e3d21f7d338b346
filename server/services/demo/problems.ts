import { createRandom } from '../../../shared/engine/random'

/** The invented problems of Brackwater Ferries, as the files a modelling script would write. */
export interface DemoFile {
  name: string
  fileName: string
  note: string
  text: string
}

const FERRIES = ['mar', 'tea', 'sam', 'dun', 'thr', 'plo', 'kno', 'whi', 'sal', 'san'] as const

interface Term {
  a: string
  b: string
  value: number
}

const lines = (comments: string[], terms: Term[]): string =>
  [...comments.map((comment) => `# ${comment}`), ...terms.map(({ a, b, value }) => `${a},${b},${value}`), ''].join('\n')

/** (Σ x − 1)² over the variables, without its constant: −1 on the diagonal and 2 on each pair, times a weight. */
function exactlyOne(variables: string[], weight: number): Term[] {
  const terms: Term[] = variables.map((a) => ({ a, b: a, value: -weight }))
  variables.forEach((a, i) => variables.slice(i + 1).forEach((b) => terms.push({ a, b, value: 2 * weight })))
  return terms
}

/** Ten ferries on four channels; ferries whose routes meet disturb each other on the same or the next channel. */
function radioChannels(): DemoFile {
  const channels = [1, 2, 3, 4]
  const random = createRandom(2026)
  const terms = FERRIES.flatMap((ferry) =>
    exactlyOne(
      channels.map((c) => `${ferry}.${c}`),
      16,
    ),
  )
  FERRIES.forEach((one, i) =>
    FERRIES.slice(i + 1).forEach((two, k) => {
      if (k > 3 || random.float() < 0.25) return
      const disturbance = 2 + random.below(7)
      for (const c of channels) {
        terms.push({ a: `${one}.${c}`, b: `${two}.${c}`, value: disturbance })
        if (c < 4 && disturbance > 5) terms.push({ a: `${one}.${c}`, b: `${two}.${c + 1}`, value: 2 })
      }
    }),
  )
  const comments = [
    'form: qubo',
    `offset: ${16 * FERRIES.length}`,
    'one of four channels for each of ten ferries, least interference between routes',
  ]
  return {
    name: 'Deck radio channels',
    fileName: 'channels-dec.csv',
    note: 'One of four channels for each of ten ferries, least interference between routes.',
    text: lines(comments, terms),
  }
}

/** Nine arrivals to six berths: each berthed once, no two at a berth whose times overlap, short tows preferred. */
function berths(): DemoFile {
  const berthNames = ['A', 'B', 'C', 'D', 'E', 'F']
  const random = createRandom(77)
  const arrivals = FERRIES.slice(0, 9).map((ferry, i) => ({ ferry, from: 40 * i, to: 40 * i + 60 + random.below(70) }))
  const terms = arrivals.flatMap(({ ferry }) => [
    ...exactlyOne(
      berthNames.map((berth) => `${ferry}.${berth}`),
      12,
    ),
    ...berthNames.map((berth) => ({ a: `${ferry}.${berth}`, b: `${ferry}.${berth}`, value: 1 + random.below(6) })),
  ])
  arrivals.forEach((one, i) =>
    arrivals.slice(i + 1).forEach((two) => {
      if (two.from < one.to)
        for (const berth of berthNames)
          terms.push({ a: `${one.ferry}.${berth}`, b: `${two.ferry}.${berth}`, value: 18 })
    }),
  )
  return {
    name: 'Berths against arrivals',
    fileName: 'berths-week-49.csv',
    note: 'Nine arrivals to six berths; overlapping stays at one berth cost 18, tows 1 to 6 a move.',
    text: lines(['form: qubo', `offset: ${12 * arrivals.length}`, 'nine arrivals, six berths'], terms),
  }
}

/** Eighteen duties split between two crews as evenly as possible: number partitioning (Lucas 2014, section 2.1). */
function twoCrews(): DemoFile {
  const random = createRandom(5)
  const hours = Array.from({ length: 18 }, () => 2 + random.below(9))
  const terms: Term[] = []
  hours.forEach((a, i) =>
    hours.slice(i + 1).forEach((b, k) => terms.push({ a: `duty${i + 1}`, b: `duty${i + k + 2}`, value: 2 * a * b })),
  )
  const offset = hours.reduce((sum, hour) => sum + hour * hour, 0)
  return {
    name: 'Two crews, one duty list',
    fileName: 'crews.csv',
    note: 'Eighteen duties to two crews; the energy is the square of the difference in hours.',
    text: lines(['form: ising', `offset: ${offset}`, `hours: ${hours.join(' ')}`], terms),
  }
}

export const DEMO_FILES = { berths: berths(), channels: radioChannels(), crews: twoCrews() }
