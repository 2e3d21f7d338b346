import { until } from './server'

export interface Answer<T> {
  status: number
  body: T
  text: string
}

/** What a browser would be shown at an address, redirections followed. */
export interface PageAnswer {
  status: number
  text: string
  endedAt: string
}

/** A file as a browser would save it. */
export interface FileAnswer {
  status: number
  type: string
  fileName: string
  bytes: Uint8Array<ArrayBuffer>
}

const textOf = (bytes: Uint8Array): string => new TextDecoder().decode(bytes)

/** A signed-in caller of the routes, with its session cookie. */
export class Client {
  private readonly cookies = new Map<string, string>()

  constructor(readonly url: string) {}

  static async signedIn(url: string, person: string): Promise<Client> {
    const client = new Client(url)
    const { status } = await client.post('/api/session', {
      email: `${person}@brackwater.example`,
      password: 'brackwater-demo',
    })
    if (status !== 200) throw new Error(`${person} could not sign in: ${status}`)
    return client
  }

  async call<T = Record<string, unknown>>(method: string, path: string, body?: unknown): Promise<Answer<T>> {
    const form = body instanceof FormData
    const type: Record<string, string> = body && !form ? { 'content-type': 'application/json' } : {}
    const sent = form ? body : body === undefined ? undefined : JSON.stringify(body)
    const { status, headers, bytes } = await this.send(method, path, type, sent)
    const text = textOf(bytes)
    const json = headers.get('content-type')?.includes('json')
    return { status, text, body: (json ? JSON.parse(text) : undefined) as T }
  }

  private async send(method: string, path: string, headers: Record<string, string>, body?: BodyInit) {
    const cookie = [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
    const response = await fetch(this.url + path, {
      method,
      headers: { ...headers, ...(this.cookies.size > 0 ? { cookie } : {}) },
      body,
      redirect: 'manual',
    })
    for (const set of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(set)!
      this.cookies.set(name!, value!)
    }
    return { status: response.status, headers: response.headers, bytes: new Uint8Array(await response.arrayBuffer()) }
  }

  /** Cookies for a browser that is to go on as this person. */
  browserCookies(): { name: string; value: string; url: string }[] {
    return [...this.cookies].map(([name, value]) => ({ name, value, url: this.url }))
  }

  async page(path: string): Promise<PageAnswer> {
    let endedAt = path
    for (let hop = 0; hop < 5; hop++) {
      const { status, headers, bytes } = await this.send('GET', endedAt, { accept: 'text/html' })
      const location = headers.get('location')
      if (status < 300 || status >= 400 || !location) return { status, text: textOf(bytes), endedAt }
      const next = new URL(location, this.url)
      endedAt = next.pathname + next.search
    }
    throw new Error(`${path} sends visitors round in circles`)
  }

  async download(path: string): Promise<FileAnswer> {
    const { status, headers, bytes } = await this.send('GET', path, {})
    const fileName = /filename="([^"]*)"/.exec(headers.get('content-disposition') ?? '')?.[1] ?? ''
    return { status, type: headers.get('content-type') ?? '', fileName, bytes }
  }

  get = <T>(path: string) => this.call<T>('GET', path)
  post = <T>(path: string, body?: unknown) => this.call<T>('POST', path, body)

  upload<T>(
    path: string,
    text: string | Uint8Array<ArrayBuffer>,
    fileName: string,
    fields: Record<string, string> = {},
  ) {
    const form = new FormData()
    for (const [name, value] of Object.entries(fields)) form.append(name, value)
    form.append('file', new Blob([text]), fileName)
    return this.call<T>('POST', path, form)
  }

  /** Waits for a job to be over and answers its final state. */
  async finished(
    jobId: string,
    seconds = 60,
  ): Promise<{ status: string; message: string; attempts: number; progress: number; startedAt: string }> {
    type Job = { status: string; message: string; attempts: number; progress: number; startedAt: string }
    return until(
      async () => {
        const { body } = await this.get<Job>(`/api/jobs/${jobId}`)
        return ['done', 'failed', 'cancelled'].includes(body.status) && body
      },
      seconds,
      `the end of job ${jobId}`,
    )
  }
}
