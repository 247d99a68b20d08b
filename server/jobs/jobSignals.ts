import { EventEmitter } from 'node:events'

/** Wakes those who follow a job in this process, and the runner when there is work; what happened stands in the database. */
export const jobSignals = new EventEmitter<{ changed: [jobId: number], queued: [], cancelled: [jobId: number] }>()
jobSignals.setMaxListeners(0)
