import { readFileSync } from 'node:fs'
import { Agent, request } from 'node:http'

/** Clock ticks a second in /proc on Linux. */
const TICKS = 100

export interface Asked {
  readonly url: string
  readonly pid: number
}

/** Milliseconds a request. */
export interface Times {
  /** Until the answer is there, one request after another over one connection. */
  readonly wall: number
  /** Of the server's processor. */
  readonly processor: number
}

/** Processor time that a process has taken so far, ms (Linux: fields 14 and 15 of its stat). */
function processorOf(pid: number): number {
  const fields = readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ').at(-1)!.split(' ')
  return ((Number(fields[11]) + Number(fields[12])) / TICKS) * 1000
}

function ask(agent: Agent, url: string, headers: Record<string, string>): Promise<number> {
  return new Promise((resolve, reject) => {
    request(url, { agent, headers }, (response) => {
      response.resume()
      response.on('end', () => resolve(response.statusCode!))
      response.on('error', reject)
    })
      .on('error', reject)
      .end()
  })
}

/** Asks a server the same again and again. @throws Error when it answers otherwise than with the status */
export async function timesOf(
  server: Asked,
  { path, status, headers }: { path: string; status: number; headers: Record<string, string> },
  requests: number,
): Promise<Times> {
  const agent = new Agent({ keepAlive: true, maxSockets: 1 })
  const before = processorOf(server.pid)
  const start = performance.now()
  for (let k = 0; k < requests; k++) {
    const answered = await ask(agent, server.url + path, headers)
    if (answered !== status) throw new Error(`${path} answered ${answered} instead of ${status}`)
  }
  const wall = (performance.now() - start) / requests
  agent.destroy()
  return { wall, processor: (processorOf(server.pid) - before) / requests }
}
