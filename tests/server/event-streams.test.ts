import { once } from 'node:events'
import { expect, it } from 'vitest'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'

it('does not keep a server that is told to stop waiting', async () => {
  const server = await startDemo()
  const client = await Client.signedIn(server.url, 'developer')
  const cookie = client
    .browserCookies()
    .map(({ name, value }) => `${name}=${value}`)
    .join('; ')
  const response = await fetch(`${server.url}/api/news/events`, { headers: { cookie } })
  const reader = response.body!.getReader()
  expect(new TextDecoder().decode((await reader.read()).value)).toContain('event: news')
  const stopped = once(server.child, 'exit')
  server.child.kill('SIGTERM')
  // Until the client's own end, or the stop of a server that waits for it: half a minute.
  const late = new Promise<string>((resolve) => setTimeout(() => resolve('late'), 10_000))
  const end = async (): Promise<string> => {
    while (!(await reader.read()).done);
    await stopped
    return 'in time'
  }
  expect(await Promise.race([end(), late])).toBe('in time')
  await server.stop('SIGKILL')
})
