import { followJob } from '../../../services/jobs/followJob'
import { readJob } from '../../../services/jobs/readJob'

/** ms between two signs of life, so that nothing on the way takes the connection for dead */
const heartbeatTime = 15_000

const lastSeen = (header: string | undefined) => (header !== undefined && /^\d{1,15}$/.test(header) ? Number(header) : null)

/** GET /api/jobs/[jobId]/events: the job's progress as server-sent events, from the state it is in or after Last-Event-ID, until it ends. */
export default defineApiHandler('GET /api/jobs/[jobId]/events', {}, async ({ event, params }) => {
  await readJob(params.jobId)
  const { res } = event.node
  const reader = new AbortController()
  res.on('close', () => reader.abort())
  setResponseHeaders(event, { 'content-type': 'text/event-stream', 'cache-control': 'no-store', 'x-accel-buffering': 'no' })
  res.flushHeaders()
  const heartbeat = setInterval(() => res.write(': still here\n\n'), heartbeatTime)
  try {
    for await (const { sequence, job } of followJob(params.jobId, lastSeen(getRequestHeader(event, 'last-event-id')), reader.signal)) {
      res.write(`id: ${sequence}\ndata: ${JSON.stringify(job)}\n\n`)
    }
  }
  finally {
    clearInterval(heartbeat)
    res.end()
  }
})
