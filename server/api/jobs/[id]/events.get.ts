import { jobOf } from '../../../services/jobs'

const LOOK_MS = 300
const OVER = new Set(['done', 'failed', 'cancelled'])

/** Server-sent events `job` with the job's state whenever it changes; the stream ends with the job. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const id = partOf(event, 'id')
  const first = await jobOf(app, actor, id)
  const stream = openEventStream(event, () => clearInterval(looking))
  let sent = ''
  const look = async (): Promise<void> => {
    const job = sent === '' ? first : await jobOf(app, actor, id)
    const text = JSON.stringify(job)
    if (text !== sent) await stream.push({ event: 'job', data: text })
    sent = text
    if (OVER.has(job.status)) await stream.close()
  }
  let busy = false
  const looking = setInterval(() => {
    // A slow look, or a reader that does not take what is sent, must not pile up further looks.
    if (busy) return
    busy = true
    void look()
      .catch(() => stream.close())
      .finally(() => (busy = false))
  }, LOOK_MS)
  return stream.send()
})
