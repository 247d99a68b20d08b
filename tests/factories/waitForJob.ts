import type { JobState } from '#shared/types/report'
import { JobRow } from '#server/database/models/JobRow'

/** Waits until the newest job of a revision is in one of these states; throws with what it says after 30 s. */
export async function waitForJob(revisionId: number, ...states: JobState[]): Promise<JobRow> {
  for (let look = 0; look < 600; look++) {
    const job = await JobRow.findOne({ where: { revisionId }, order: [['id', 'DESC']] })
    if (job && states.includes(job.state)) return job
    await new Promise(resolve => setTimeout(resolve, 50))
  }
  const job = await JobRow.findOne({ where: { revisionId }, order: [['id', 'DESC']] })
  throw new Error(`the job is ${job?.state} at '${job?.step}': ${job?.error}`)
}
