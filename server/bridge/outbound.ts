import { lookup } from 'node:dns'
import type { IncomingMessage } from 'node:http'
import { request as plainRequest } from 'node:http'
import { request as secureRequest } from 'node:https'
import type { LookupFunction } from 'node:net'
import { isIP } from 'node:net'
import type { AddressRules } from './addresses'

/** All of one call, from the name's look-up to the end of the answer. */
const CALL_MS = 30_000
/** More of an answer is not read. */
const MOST_ANSWER_BYTES = 4096

export interface OutboundAnswer {
  status: number
  /** As it came. */
  retryAfter: string | null
  location: string | null
  /** Of the answer's body, its beginning. */
  text: string
}

/** Sends calls to addresses that people typed. */
export interface Outbound {
  /**
   * @throws OutboundRefused where the address may not be called; any other error where it may work another time
   */
  post(url: string, headers: Record<string, string>, body: string): Promise<OutboundAnswer>
}

/** An address that this installation does not call. */
export class OutboundRefused extends Error {}

const refusal = (host: string, address: string): OutboundRefused =>
  new OutboundRefused(
    host === address
      ? `${address} is not an address of the public internet`
      : `${host} leads to ${address}, which is not an address of the public internet`,
  )

const needsTls = (host: string): OutboundRefused =>
  new OutboundRefused(`${host} is public, so it is called by https only`)

/** Judges every address of a name, at the moment of connecting: what the name leads to later is judged then. */
const guardedLookup =
  (rules: AddressRules, isPlain: boolean): LookupFunction =>
  (host, options, done) => {
    lookup(host, { ...options, all: true }, (error, addresses) => {
      if (error) return done(error, [])
      const wrong = wrongIn(
        host,
        addresses.map(({ address }) => address),
        rules,
        isPlain,
      )
      if (wrong) return done(wrong, [])
      if (options.all) return done(null, addresses)
      done(null, addresses[0]!.address, addresses[0]!.family)
    })
  }

function wrongIn(host: string, addresses: readonly string[], rules: AddressRules, isPlain: boolean): Error | null {
  for (const address of addresses) {
    const verdict = rules.verdictOn(address)
    if (verdict === 'refused') return refusal(host, address)
    if (verdict === 'public' && isPlain) return needsTls(host)
  }
  return addresses.length > 0 ? null : new Error(`${host} has no address`)
}

/** The beginning of an answer; the rest is never waited for. */
async function beginningOf(answer: IncomingMessage): Promise<string> {
  const chunks: Buffer[] = []
  let bytes = 0
  for await (const chunk of answer as AsyncIterable<Buffer>) {
    chunks.push(chunk)
    bytes += chunk.length
    if (bytes >= MOST_ANSWER_BYTES) break
  }
  return Buffer.concat(chunks).subarray(0, MOST_ANSWER_BYTES).toString('utf8')
}

/**
 * Calls over HTTP, each over a connection of its own. Redirects are not followed.
 * @param callMs how long a call may take
 */
export function createOutbound(rules: AddressRules, callMs = CALL_MS): Outbound {
  return {
    async post(text, headers, body) {
      const url = new URL(text)
      const isPlain = url.protocol === 'http:'
      const host = url.hostname.replace(/^\[|\]$/g, '')
      // Where the host is an address no name is looked up.
      const wrong = isIP(host) ? wrongIn(host, [host], rules, isPlain) : null
      if (wrong) throw wrong
      const signal = AbortSignal.timeout(callMs)
      try {
        const answer = await answerTo(url, { headers, body, signal, lookup: guardedLookup(rules, isPlain) })
        const { statusCode = 0, headers: answered } = answer
        const beginning = await beginningOf(answer)
        return {
          status: statusCode,
          retryAfter: answered['retry-after'] ?? null,
          location: answered.location ?? null,
          text: beginning,
        }
      } catch (error) {
        throw signal.aborted ? new Error(`no whole answer within ${callMs / 1000} s`) : error
      }
    },
  }
}

interface Sending {
  headers: Record<string, string>
  body: string
  signal: AbortSignal
  lookup: LookupFunction
}

function answerTo(url: URL, { headers, body, signal, lookup }: Sending): Promise<IncomingMessage> {
  const send = url.protocol === 'http:' ? plainRequest : secureRequest
  const bytes = Buffer.from(body)
  return new Promise((resolve, reject) => {
    const request = send(
      url,
      { method: 'POST', headers: { ...headers, 'content-length': bytes.length }, signal, lookup, agent: false },
      resolve,
    )
    request.on('error', reject)
    request.end(bytes)
  })
}
