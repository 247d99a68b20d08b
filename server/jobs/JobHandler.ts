import type { JobRow } from '../database/models/JobRow'

/** What a handler is given while its job runs. */
export interface RunningJob {
  job: JobRow
  /** aborted when the job is cancelled or the server stops */
  signal: AbortSignal
  /** Tells how far the work has come, in words; kept at most a few times a second. */
  progress: (step: string, done: number, total: number) => Promise<void>
}

/**
 * Does the work of one job outside any transaction and returns what stores its result: that runs in the very transaction
 * that marks the job done, so a job is done with its result or not at all.
 */
export type JobHandler = (running: RunningJob) => Promise<() => Promise<void>>
