import { until } from './server'

export interface Answer<T> {
  status: number
  body: T
  text: string
}

/** A signed-in caller of the routes, with its session cookie. */
export class Client {
  private cookie = ''

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
    const response = await fetch(this.url + path, {
      method,
      headers: {
        ...(this.cookie ? { cookie: this.cookie } : {}),
        ...(body && !form ? { 'content-type': 'application/json' } : {}),
      },
      body: form ? body : body === undefined ? undefined : JSON.stringify(body),
    })
    for (const cookie of response.headers.getSetCookie()) this.cookie = cookie.split(';')[0]!
    const text = await response.text()
    const json = response.headers.get('content-type')?.includes('json')
    return { status: response.status, text, body: (json ? JSON.parse(text) : undefined) as T }
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
