import { createRandom } from '../../shared/engine/random'

/** A file with a million entries, made from a seed. */
export interface FileCase {
  readonly name: string
  readonly about: string
  readonly text: (entries: number) => string
}

const VARIABLES = 20_000
const SEED = 5

/** Entries in no order, each line written by `line`. */
function listOf(entries: number, line: (i: number, j: number, value: number) => string): string {
  const random = createRandom(SEED)
  const lines: string[] = []
  for (let k = 0; k < entries; k++) {
    const i = random.below(VARIABLES)
    const j = (i + 1 + random.below(VARIABLES - 1)) % VARIABLES
    lines.push(line(i, j, 2 * random.float() - 1))
  }
  return `${lines.join('\n')}\n`
}

export const FILES: readonly FileCase[] = [
  {
    name: 'numbers',
    about: 'coefficient list, variables 0 … 19,999, six decimals',
    text: (entries) => listOf(entries, (i, j, value) => `${i} ${j} ${value.toFixed(6)}`),
  },
  {
    name: 'names',
    about: 'coefficient list, variables x0 … x19999, commas, six decimals',
    text: (entries) => listOf(entries, (i, j, value) => `x${i},x${j},${value.toFixed(6)}`),
  },
  {
    name: 'doubles',
    about: 'coefficient list, every digit of a double',
    text: (entries) => listOf(entries, (i, j, value) => `${i} ${j} ${value}`),
  },
]
