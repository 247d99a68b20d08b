import type { Job } from '#shared/types/report'
import type { JobRow } from '../database/models/JobRow'

/** A job as the screens see it. */
export const presentJob = ({ id, kind, revisionId, edition, state, step, done, total, error }: JobRow): Job => ({ id, kind, revisionId, edition, state, step, done, total, error })
