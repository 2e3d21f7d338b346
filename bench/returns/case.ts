import { createRandom } from '../../shared/engine/random'
import type { Client } from '../../tests/support/client'

/** Share of the variables turned from the planted state in a row, and of the qubits turned from their variable. */
const TURNED = { variables: 0.05, qubits: 0.01 }

export interface Case {
  runSheetId: string
  /** Numbers of the used qubits, ascending, and the variable of each. */
  qubits: number[]
  variableOf: number[]
  variables: number
}

/**
 * A problem that takes up every qubit of a Chimera machine: variable k of a cell is its vertical qubit k and its
 * horizontal qubit k, so that each is coupled with the others of its cell and with its like in the four cells around it.
 */
export async function setUpCase(client: Client, cells: number): Promise<Case> {
  const random = createRandom(1)
  const name = (row: number, col: number, k: number): string => `v${(row * cells + col) * 4 + k}`
  const lines: string[] = ['# form: ising']
  const coupling = (): number => (random.below(41) - 20) / 10 || 1
  for (let row = 0; row < cells; row++)
    for (let col = 0; col < cells; col++)
      for (let k = 0; k < 4; k++) {
        for (let j = 0; j < k; j++) lines.push(`${name(row, col, j)} ${name(row, col, k)} ${coupling()}`)
        if (row > 0) lines.push(`${name(row - 1, col, k)} ${name(row, col, k)} ${coupling()}`)
        if (col > 0) lines.push(`${name(row, col - 1, k)} ${name(row, col, k)} ${coupling()}`)
      }
  const made = async (path: string, body: unknown): Promise<{ id: string }> => {
    const { status, body: answer, text } = await client.post<{ id: string }>(path, body)
    if (status !== 201) throw new Error(`${path} answered ${status}: ${text}`)
    return answer
  }
  const problem = await client.upload<{ id: string }>('/api/problems', lines.join('\n'), 'bench.txt')
  const machine = await made('/api/machines', { name: 'Bench', family: { kind: 'chimera', m: cells } })
  const chains: Record<string, number[]> = {}
  const variableOf: number[] = []
  for (let cell = 0; cell < cells * cells; cell++)
    for (let k = 0; k < 4; k++) {
      chains[`v${cell * 4 + k}`] = [cell * 8 + k, cell * 8 + 4 + k]
      variableOf[cell * 8 + k] = cell * 4 + k
      variableOf[cell * 8 + 4 + k] = cell * 4 + k
    }
  const embedding = await made('/api/embeddings/import', {
    problemId: problem.body.id,
    machineId: machine.id,
    chains,
  })
  const sheet = await made('/api/run-sheets', { embeddingId: embedding.id, reads: 10_000 })
  const variables = 4 * cells * cells
  return { runSheetId: sheet.id, qubits: variableOf.map((_, q) => q), variableOf, variables }
}

/** Spins of every row, one byte each: a planted state with some variables and some qubits turned. */
export function rowsOf({ variableOf, variables }: Case, reads: number): Int8Array {
  const random = createRandom(2)
  const planted = Int8Array.from({ length: variables }, () => (random.float() < 0.5 ? 1 : -1))
  const spins = new Int8Array(reads * variableOf.length)
  const row = new Int8Array(variables)
  for (let r = 0; r < reads; r++) {
    for (let i = 0; i < variables; i++) row[i] = random.float() < TURNED.variables ? -planted[i]! : planted[i]!
    for (let q = 0; q < variableOf.length; q++) {
      const spin = row[variableOf[q]!]!
      spins[r * variableOf.length + q] = random.float() < TURNED.qubits ? -spin : spin
    }
  }
  return spins
}
