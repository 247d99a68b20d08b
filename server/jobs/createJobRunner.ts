import { Op } from 'sequelize'
import { AppError } from '#shared/errors/AppError'
import { writeTransaction } from '../database/database'
import { JobRow } from '../database/models/JobRow'
import type { JobHandler } from './JobHandler'
import { jobSignals } from './jobSignals'
import { recordJob } from './recordJob'

export interface JobRunnerOptions {
  handlers: Record<JobRow['kind'], JobHandler>
  clock?: () => Date
  /** told of a failure that is a fault of the program */
  onFault?: (error: unknown, jobId: number) => void
  /** ms a claim holds without a sign of life. @default 15000 */
  leaseTime?: number
  /** ms between two looks into the queue when nothing wakes the runner. @default 5000 */
  pollTime?: number
  /** ms between two stored steps of progress. @default 250 */
  progressTime?: number
  /** @default 3 */
  mostAttempts?: number
}

export interface JobRunner {
  start: () => void
  /** Stops taking jobs, aborts the running one and gives it back to the queue. */
  stop: () => Promise<void>
}

const unexpectedWords = 'Something went wrong on the server and was noted there. Render again; if it stays so, tell your administrator.'

/**
 * Runs the jobs of the database one at a time. A job is claimed with a lease that is renewed while it runs: one whose server died
 * is taken up again when its lease has run out, so the queue survives a restart. After `mostAttempts` claims it fails.
 */
export function createJobRunner(options: JobRunnerOptions): JobRunner {
  const { handlers, clock = () => new Date(), leaseTime = 15_000, pollTime = 5000, progressTime = 250, mostAttempts = 3 } = options
  let isStarted = false
  let timer: NodeJS.Timeout | undefined
  let current: { jobId: number, abort: AbortController, ended: Promise<void> } | null = null
  const leaseEnd = () => new Date(clock().getTime() + leaseTime).toISOString()

  const nextJob = () => JobRow.findOne({
    where: { [Op.or]: [{ state: 'queued' }, { state: 'running', leaseUntil: { [Op.lt]: clock().toISOString() } }] },
    order: [['id', 'ASC']],
  })

  /** The next job that waits, or whose runner is gone; null when there is none. */
  const claim = () => writeTransaction(async (): Promise<JobRow | null> => {
    for (let job = await nextJob(); job !== null; job = await nextJob()) {
      if (job.attempts < mostAttempts) {
        await recordJob(job, { state: 'running', step: 'Starting', done: 0, attempts: job.attempts + 1, leaseUntil: leaseEnd() }, clock())
        return job
      }
      const error = `The server stopped ${job.attempts} times while rendering this document. Look at the memory of this machine, then render again.`
      await recordJob(job, { state: 'failed', step: 'Failed', leaseUntil: null, finishedAt: clock().toISOString(), error }, clock())
    }
    return null
  })

  /** Whether the job is still this runner's: a cancelled one is not. */
  async function isStillRunning(job: JobRow): Promise<boolean> {
    const found = await JobRow.findByPk(job.id, { attributes: ['state', 'attempts'] })
    return found?.state === 'running' && found.attempts === job.attempts
  }

  const finish = (job: JobRow, store: () => Promise<void>) => writeTransaction(async () => {
    if (!await isStillRunning(job)) return
    await store()
    await recordJob(job, { state: 'done', step: 'Done', done: job.total, leaseUntil: null, finishedAt: clock().toISOString() }, clock())
  })

  const fail = (job: JobRow, error: unknown) => writeTransaction(async () => {
    if (!await isStillRunning(job)) return
    const words = error instanceof AppError && error.code !== 'unexpected' ? error.message : unexpectedWords
    await recordJob(job, { state: 'failed', step: 'Failed', error: words, leaseUntil: null, finishedAt: clock().toISOString() }, clock())
  })

  const giveBack = (job: JobRow) => writeTransaction(async () => {
    if (!await isStillRunning(job)) return
    // The stop was asked for: it is no attempt that failed.
    await recordJob(job, { state: 'queued', step: 'Waiting its turn', leaseUntil: null, attempts: job.attempts - 1 }, clock())
  })

  function progressOf(job: JobRow): (step: string, done: number, total: number) => Promise<void> {
    let storedAt = -Infinity
    let storedKind = ''
    return async (step, done, total) => {
      const now = clock().getTime()
      // A step of another kind ('Drawing ...', 'Printing ...') is always told: it may be the longest and the last.
      const kind = step.split(' ', 1)[0] ?? ''
      if (kind === storedKind && now - storedAt < progressTime) return
      storedKind = kind
      storedAt = now
      await writeTransaction(async () => {
        if (await isStillRunning(job)) await recordJob(job, { step, done, total, leaseUntil: leaseEnd() }, clock())
      })
    }
  }

  async function run(job: JobRow, abort: AbortController): Promise<void> {
    const heartbeat = setInterval(() => {
      void writeTransaction(async () => {
        if (await isStillRunning(job)) await job.update({ leaseUntil: leaseEnd() })
      }).catch(error => options.onFault?.(error, job.id))
    }, leaseTime / 3)
    try {
      const store = await handlers[job.kind]({ job, signal: abort.signal, progress: progressOf(job) })
      await finish(job, store)
    }
    catch (error) {
      if (abort.signal.aborted) return await giveBack(job)
      if (!(error instanceof AppError) || error.code === 'unexpected') options.onFault?.(error, job.id)
      await fail(job, error)
    }
    finally {
      clearInterval(heartbeat)
    }
  }

  /** Works until the queue is empty; one call at a time. */
  async function work(): Promise<void> {
    while (isStarted && current === null) {
      const job = await claim()
      // Stopped while claiming: the claim is given back.
      if (job && !isStarted) return giveBack(job)
      if (!job) return
      const abort = new AbortController()
      const ended = run(job, abort)
      current = { jobId: job.id, abort, ended }
      await ended.finally(() => {
        current = null
      })
    }
  }

  let working: Promise<void> = Promise.resolve()
  let isWorking = false
  function wake(): void {
    clearTimeout(timer)
    if (!isStarted || isWorking) return
    isWorking = true
    working = work().catch(error => options.onFault?.(error, current?.jobId ?? 0)).finally(() => {
      isWorking = false
      if (!isStarted) return
      timer = setTimeout(wake, pollTime)
      timer.unref()
    })
  }

  const onCancelled = (jobId: number) => {
    if (current?.jobId === jobId) current.abort.abort(new AppError('conflict', 'The job was cancelled.'))
  }

  return {
    start() {
      isStarted = true
      jobSignals.on('queued', wake)
      jobSignals.on('cancelled', onCancelled)
      wake()
    },
    async stop() {
      isStarted = false
      clearTimeout(timer)
      jobSignals.off('queued', wake)
      jobSignals.off('cancelled', onCancelled)
      current?.abort.abort(new AppError('unavailable', 'The server is stopping.'))
      await working
    },
  }
}
