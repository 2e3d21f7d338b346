import { readZip } from '../../shared/engine/formats/archive'
import { writeSamplesCsv } from '../../shared/engine/readout/files/write-csv'
import { ANNEAL_DEFAULTS } from '../../shared/engine/sampling/annealing-schedule'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import type { ProgrammedView } from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import { callOfToken, takeSamples } from '../services/bridge-returns'
import type { RehearsalSettings } from '../services/rehearsal-settings'
import { asStoredFile } from '../services/stored-files'
import type { OutboundAnswer } from './outbound'

/** As many as show how a run sheet goes: the answer has to come while the call is open. */
const MOST_READS = 1000
const SWEEPS = 256
const SEED = 1

const answer = (status: number, text: string): OutboundAnswer => ({ status, retryAfter: null, location: null, text })

/** What a call of this installation holds, as far as it is used here. */
interface Received {
  event: string
  runSheet: { reads: number }
  return: { samplesUrl: string; token: string }
  bundle: { base64: string }
}

/**
 * The built-in bridge, for trying out what a team's own one is for: it takes the same calls, rehearses the programmed
 * problem of the bundle, and sends that back with the token of the call.
 */
export async function rehearsalBridge(app: App, body: string): Promise<OutboundAnswer> {
  const received = JSON.parse(body) as Received
  if (received.event === 'test') return answer(200, 'The built-in bridge is ready.')
  const { qubitIds, ...programmed } = problemIn(Buffer.from(received.bundle.base64, 'base64'))
  const made = settingsOf(Math.min(received.runSheet.reads, MOST_READS))
  const samples = await app.compute.run('rehearse', {
    ...{ programmed, gauge: null, error: null, firstRead: 0 },
    ...{ reads: made.reads, sweeps: made.sweeps, seed: made.seed },
    method: { model: 'simulated annealing', temperature: made.temperature, arithmetic: made.arithmetic },
  })
  const csv = Buffer.from(writeSamplesCsv(samples, qubitIds))
  const call = await callOfToken(app, callIn(received.return.samplesUrl), received.return.token)
  await asStoredFile('rehearsed.csv', csv, (file) => takeSamples(app, call, file, uploadReturnSchema.parse({}), made))
  return answer(200, `${made.reads} reads rehearsed and sent back.`)
}

/** Samples are sent where a call says, over no network. */
const callIn = (samplesUrl: string): string => samplesUrl.split('/').at(-2)!

const settingsOf = (reads: number): RehearsalSettings => ({
  ...{ model: 'simulated annealing', reads, sweeps: SWEEPS, temperature: ANNEAL_DEFAULTS.temperature },
  ...{ arithmetic: '64-bit', rounding: 0, controlError: false, sigmaH: 0, sigmaJ: 0, slices: null, seed: SEED },
})

/** The programmed problem of a bundle, by position in ascending order of the qubits' numbers. */
function problemIn(bundle: Uint8Array) {
  for (const [, contents] of readZip(bundle, (name) => name.endsWith('/problem.json'))) {
    const { h, J, scale, offset } = JSON.parse(new TextDecoder().decode(contents)) as ProgrammedView
    const qubitIds = Object.keys(h).map(Number)
    const at = new Map(qubitIds.map((id, position) => [id, position]))
    return {
      ...{ qubitIds, scale, offset, limitedBy: 'nothing' as const },
      qubits: Uint32Array.from(qubitIds.keys()),
      h: Float64Array.from(Object.values(h)),
      ends: Uint32Array.from(J.flatMap(([a, b]) => [at.get(a)!, at.get(b)!])),
      J: Float64Array.from(J, ([, , value]) => value),
      isChainCoupler: new Uint8Array(J.length),
      chainStrength: new Float64Array(0),
      chainOf: new Uint32Array(qubitIds.length),
    }
  }
  throw new Error('the bundle holds no problem')
}
