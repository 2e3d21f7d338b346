import type { Objective } from '../../shared/engine/embedding/objective'
import type { EmbeddingTask } from '../../shared/engine/embedding/task'
import { sizeOf } from '../../shared/engine/graph/graph'
import type { Graph } from '../../shared/engine/graph/graph'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../shared/engine/machine/defects'
import type { Defects, Fabric, PublishedFamily } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import { completeGraph, latticeGraph, randomGraph, regularGraph, shuffledGraph, tourGraph } from './generators'

/** What is asked of a row: found on half the seeds, or a median of at most `limit`. */
export interface Bar {
  readonly level: 'hard' | 'moonshot'
  readonly measure: 'found' | 'first seconds' | 'qubits' | 'ratio'
  readonly limit: number
}

/** One line of the benchmark: problems from seeds on a machine, and what is asked. */
export interface Row {
  readonly name: string
  readonly timeLimitSeconds: number
  readonly objective: Objective
  readonly bars: readonly Bar[]
  readonly quick: boolean
  readonly make: (seed: number) => EmbeddingTask
}

interface Machine {
  readonly name: string
  readonly family: PublishedFamily
  readonly defects?: { readonly qubits: number; readonly couplers: number }
}

const C16: Machine = { name: 'C16', family: { kind: 'chimera', m: 16, n: 16, t: 4 } }
const C50: Machine = { name: 'C50', family: { kind: 'chimera', m: 50, n: 50, t: 4 } }
const P16: Machine = { name: 'P16', family: { kind: 'pegasus', m: 16, trimmed: true } }
const P40: Machine = { name: 'P40', family: { kind: 'pegasus', m: 40, trimmed: true } }
const Z15: Machine = { name: 'Z15', family: { kind: 'zephyr', m: 15, t: 4 } }
const KING: Machine = { name: "king's 320²", family: { kind: 'king', width: 320, height: 320 } }

const missing = (machine: Machine): Machine => ({
  ...machine,
  name: `${machine.name} with defects`,
  defects: { qubits: 0.02, couplers: 0.01 },
})

/** Streams of random numbers of one seed. */
const STREAMS = { problem: 0, order: 1, defects: 2 }

const fabrics = new Map<string, Fabric>()
function fabricOf({ family }: Machine): Fabric {
  const key = JSON.stringify(family)
  if (!fabrics.has(key)) fabrics.set(key, buildFabric(family))
  return fabrics.get(key)!
}

function drawDefects({ graph, ids }: Fabric, shares: NonNullable<Machine['defects']>, random: Random): Defects {
  const couplers: [number, number][] = []
  for (let k = 0; k < sizeOf(graph); k++)
    if (random.float() < shares.couplers) couplers.push([ids[graph.ends[2 * k]!]!, ids[graph.ends[2 * k + 1]!]!])
  return { qubits: Array.from(ids).filter(() => random.float() < shares.qubits), couplers }
}

function taskOn(machine: Machine, problem: Graph, seed: number): EmbeddingTask {
  const fabric = fabricOf(machine)
  const defects = machine.defects
    ? drawDefects(fabric, machine.defects, createRandom(seed, STREAMS.defects))
    : { qubits: [], couplers: [] }
  const { graph, usable } = applyDefects(fabric, defects)
  return { problem, machine: graph, usable, segments: fabric.segments, family: machine.family, start: null }
}

type Extras = Partial<Pick<Row, 'timeLimitSeconds' | 'objective' | 'quick'>>
type MakeProblem = (random: Random) => Graph

/** A row whose problems come from the seed; their vertices are in random order. */
function row(problemName: string, machine: Machine, make: MakeProblem, bars: readonly Bar[], extras: Extras = {}): Row {
  return {
    name: `${problemName} on ${machine.name}`,
    timeLimitSeconds: 10,
    objective: bars.some(({ measure }) => measure === 'qubits' || measure === 'ratio')
      ? 'total qubits'
      : 'longest chain',
    quick: false,
    bars,
    make: (seed) => {
      const problem = make(createRandom(seed, STREAMS.problem))
      return taskOn(machine, shuffledGraph(problem, createRandom(seed, STREAMS.order)), seed)
    },
    ...extras,
  }
}

const atMost = (measure: Bar['measure'], hard: number, moonshot: number): Bar[] => [
  { level: 'hard', measure, limit: hard },
  { level: 'moonshot', measure, limit: moonshot },
]

/** Share of the baseline's qubits that sparse problems may take. */
const RATIO = atMost('ratio', 0.55, 0.45)

type Shape = (size: number) => { name: string; make: MakeProblem }

/** Rows for a hard and a moonshot size on each machine; one row when they are alike. */
function sized(shape: Shape, sizes: readonly (readonly [Machine, number, number])[], extras: Extras = {}): Row[] {
  return sizes.flatMap(([machine, hard, moonshot]) =>
    [...new Set([hard, moonshot])].map((size) => {
      const { name, make } = shape(size)
      const bars: Bar[] = []
      if (size === hard) bars.push({ level: 'hard', measure: 'found', limit: 0 })
      if (size === moonshot) bars.push({ level: 'moonshot', measure: 'found', limit: 0 })
      return row(name, machine, make, bars, extras)
    }),
  )
}

const regular =
  (degree: number): Shape =>
  (n) => ({ name: `${degree}-regular ${n}`, make: (random) => regularGraph(n, degree, random) })
const sparseRandom: Shape = (n) => ({ name: `G(${n}, 0.1)`, make: (random) => randomGraph(n, 0.1, random) })
const tour: Shape = (n) => ({ name: `tour ${n}²`, make: () => tourGraph(n) })
const cubic: Shape = (side) => ({ name: `grid ${side}³`, make: () => latticeGraph(side, side, side) })
const square: Shape = (side) => ({ name: `grid ${side}²`, make: () => latticeGraph(side, side) })
const complete: Shape = (n) => ({ name: `K_${n}`, make: () => completeGraph(n) })

const measured = (shape: Shape, size: number, machine: Machine, bars: readonly Bar[], extras: Extras = {}): Row => {
  const { name, make } = shape(size)
  return row(name, machine, make, bars, extras)
}

export const ROWS: readonly Row[] = [
  measured(regular(3), 100, C16, [...atMost('qubits', 260, 230), ...RATIO], { quick: true }),
  measured(regular(3), 200, C16, [...atMost('first seconds', 0.1, 0.03), ...atMost('qubits', 640, 560), ...RATIO]),
  measured(regular(3), 300, P16, [...atMost('qubits', 600, 530), ...RATIO], { quick: true }),
  measured(regular(3), 800, P16, atMost('first seconds', 0.4, 0.15)),
  measured(square, 12, C16, RATIO, { quick: true }),
  measured(cubic, 5, P16, RATIO),
  measured(regular(8), 250, P16, atMost('qubits', 1950, 1750)),
  measured(sparseRandom, 180, P16, atMost('qubits', 2050, 1800)),
  measured(complete, 50, C16, atMost('qubits', 930, 860), { quick: true }),
  measured(complete, 130, P16, atMost('qubits', 2230, 2100)),
  measured(complete, 180, P16, atMost('qubits', 3340, 3100)),
  ...sized(regular(3), [
    [C16, 220, 220],
    [P16, 400, 400],
    [Z15, 500, 500],
  ]).map((reference): Row => ({ ...reference, bars: [] })),
  ...sized(regular(3), [
    [C16, 400, 450],
    [P16, 1220, 1400],
    [Z15, 1550, 1800],
  ]),
  ...sized(regular(4), [
    [C16, 240, 270],
    [P16, 740, 850],
    [Z15, 880, 1000],
  ]),
  ...sized(regular(6), [[P16, 420, 460]]),
  ...sized(regular(8), [[P16, 350, 400]]),
  ...sized(regular(12), [[P16, 290, 320]]),
  ...sized(sparseRandom, [[P16, 230, 255]]),
  ...sized(tour, [
    [P16, 14, 15],
    [Z15, 15, 17],
  ]),
  ...sized(cubic, [
    [C16, 7, 8],
    [P16, 11, 13],
    [Z15, 12, 14],
  ]),
  ...sized(square, [
    [C16, 29, 32],
    [P16, 55, 60],
    [C50, 80, 90],
    [KING, 140, 200],
  ]),
  ...sized(
    complete,
    [
      [C16, 65, 65],
      [P16, 182, 183],
      [Z15, 240, 243],
      [missing(C16), 62, 64],
      [missing(P16), 170, 178],
      [missing(Z15), 225, 236],
    ],
    { timeLimitSeconds: 2 },
  ),
  ...sized(regular(3), [[P40, 2200, 2800]], { timeLimitSeconds: 60 }),
]

/** Rows of the memory measurement: the largest growth of resident memory that is allowed, in MiB. */
export const MEMORY_ROWS: readonly { readonly row: Row; readonly limitMebibytes: number }[] = [
  { row: measured(regular(3), 1220, P16, []), limitMebibytes: 200 },
  { row: measured(regular(8), 350, P16, []), limitMebibytes: 200 },
  { row: measured(complete, 182, P16, []), limitMebibytes: 200 },
  { row: measured(square, 140, KING, []), limitMebibytes: 1024 },
]
