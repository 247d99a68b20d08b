import { Op } from 'sequelize'
import type { Job } from '#shared/types/report'
import { JobEvent } from '../../database/models/JobEvent'
import { jobSignals } from '../../jobs/jobSignals'
import { presentJob } from '../../presenters/presentJob'
import { findJob } from './findJob'

export interface JobBeat {
  sequence: number
  job: Job
}

/** ms between two looks at the database when no signal comes, as from another process. */
const lookTime = 2000

const isEnded = ({ state }: Job) => state === 'done' || state === 'failed' || state === 'cancelled'

/** Waits for a signal about this job, the next look, or the end of the reader's interest. */
function nextSignal(jobId: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const end = () => {
      clearTimeout(timer)
      jobSignals.off('changed', onChanged)
      signal.removeEventListener('abort', end)
      resolve()
    }
    const onChanged = (changed: number) => {
      if (changed === jobId) end()
    }
    const timer = setTimeout(end, lookTime)
    jobSignals.on('changed', onChanged)
    signal.addEventListener('abort', end, { once: true })
  })
}

/**
 * The progress of a job from its events in the database: what happened after `after`, or the newest state at once, then each change,
 * until the job ends or the reader leaves.
 */
export async function* followJob(jobId: number, after: number | null, signal: AbortSignal): AsyncGenerator<JobBeat> {
  let seen = after
  while (!signal.aborted) {
    const events = seen === null
      ? await JobEvent.findAll({ where: { jobId }, order: [['sequence', 'DESC']], limit: 1 })
      : await JobEvent.findAll({ where: { jobId, sequence: { [Op.gt]: seen } }, order: [['sequence', 'ASC']] })
    for (const { sequence, payload } of events) {
      seen = sequence
      yield { sequence, job: payload }
      if (isEnded(payload)) return
    }
    if (events.length === 0) {
      const job = presentJob(await findJob(jobId))
      // A job whose events are gone, or that none were kept of, is told by its row.
      if (seen === null) yield { sequence: 0, job }
      if (isEnded(job)) return
    }
    seen ??= 0
    await nextSignal(jobId, signal)
  }
}
