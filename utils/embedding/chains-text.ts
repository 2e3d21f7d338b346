/** Chains as they were pasted, or what stands in the way of reading them. */
export type ChainsReading =
  | { ok: true; chains: Record<string, number[]>; variables: number; qubits: number }
  | { ok: false; problems: { path?: string; line?: number; message: string }[] }

const LARGEST_QUBIT = 4_294_967_295

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** The line on which JSON stops being readable, where the browser says the place. */
function lineOf(text: string, error: unknown): number | undefined {
  const at = /position (\d+)/.exec(String(error))?.[1]
  return at === undefined ? undefined : text.slice(0, Number(at)).split('\n').length
}

function chainProblem(chain: unknown): string | null {
  if (!Array.isArray(chain)) return 'is not a list of qubit numbers such as [17, 42]'
  const wrong = chain.find((qubit) => !Number.isInteger(qubit) || qubit < 0 || qubit > LARGEST_QUBIT)
  return wrong === undefined ? null : `holds ${JSON.stringify(wrong)}, which is not a qubit number`
}

/**
 * Reads chains as JSON: an object from variable label to a list of qubit numbers, or such an object under `chains`.
 * Whether the chains keep the rules of an embedding is for the server to say.
 */
export function readChainsText(text: string): ChainsReading {
  let value: unknown
  try {
    value = JSON.parse(text)
  } catch (error) {
    const message = 'This is not readable as JSON. Labels stand in double quotes, and no comma before the last bracket.'
    return { ok: false, problems: [{ line: lineOf(text, error), message }] }
  }
  const chains = isRecord(value) && isRecord(value.chains) ? value.chains : value
  if (!isRecord(chains))
    return { ok: false, problems: [{ message: 'Write an object such as { "a": [17, 42], "b": [18] }.' }] }
  const problems = Object.entries(chains).flatMap(([path, chain]) => {
    const problem = chainProblem(chain)
    return problem ? [{ path, message: `The chain of ${path} ${problem}.` }] : []
  })
  if (problems.length > 0) return { ok: false, problems }
  const read = chains as Record<string, number[]>
  const qubits = Object.values(read).reduce((sum, chain) => sum + chain.length, 0)
  return { ok: true, chains: read, variables: Object.keys(read).length, qubits }
}

/** Chains as JSON, one variable a line. */
export function writeChainsText(chains: Readonly<Record<string, readonly number[]>>): string {
  const lines = Object.entries(chains).map(([label, chain]) => `  ${JSON.stringify(label)}: [${chain.join(', ')}]`)
  return `{\n${lines.join(',\n')}\n}\n`
}
