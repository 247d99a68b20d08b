import type { Job } from '#shared/types/report'
import type { MaybeRefOrGetter } from 'vue'
import { jobsClient } from '~/services/jobsClient'

const isOver = (job: Job) => job.state === 'done' || job.state === 'failed' || job.state === 'cancelled'

/**
 * Follows a rendering job by server-sent events, from whatever state it is in, so that a reload goes on where it was.
 * `ended` is called once when the job ends while it is followed.
 */
export function useJobProgress(start: MaybeRefOrGetter<Job | null>, ended: () => void) {
  const job = shallowRef<Job | null>(null)
  let stream: EventSource | null = null

  function stop(): void {
    stream?.close()
    stream = null
  }

  function follow(next: Job): void {
    stop()
    job.value = next
    if (isOver(next)) return
    stream = new EventSource(jobsClient.eventsPath(next.id))
    stream.onmessage = (event: MessageEvent<string>) => {
      job.value = JSON.parse(event.data) as Job
      if (!isOver(job.value)) return
      stop()
      ended()
    }
  }

  onMounted(() => watch(() => toValue(start), (next) => {
    if (next !== null) follow(next)
  }, { immediate: true }))
  onBeforeUnmount(stop)

  return { job, isRunning: computed(() => job.value !== null && !isOver(job.value)) }
}
