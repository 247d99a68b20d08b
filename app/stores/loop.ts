import { defineStore } from 'pinia'
import { loopsClient, type LoopDetail, type NewSource } from '~/services/loopsClient'
import { sourcesClient } from '~/services/sourcesClient'
import type { SourceDefinition } from '#shared/types/source'

/** The loop that is open, with its sources and what the engine says of each condition; after each change it is read again. */
export const useLoopStore = defineStore('loop', () => {
  const loopId = ref<number | null>(null)
  const { value: detail, error, load } = useLoad<LoopDetail | null>(async () => loopId.value === null ? null : loopsClient.read(loopId.value))

  async function open(id: number): Promise<void> {
    if (loopId.value !== id) {
      loopId.value = id
      detail.value = null
    }
    await load()
  }

  /** Does the work on the open loop, then reads it again. */
  async function change<Reply>(work: (id: number) => Promise<Reply>): Promise<Reply> {
    if (loopId.value === null) throw new Error('No loop is open.')
    const reply = await work(loopId.value)
    await load()
    return reply
  }

  return {
    loopId, detail, error, load, open,
    createSources: (fields: NewSource) => change(id => loopsClient.createSources(id, fields)),
    changeSource: (sourceId: number, fields: { version: number, name: string, definition: SourceDefinition, setAsideReason: string }) => change(() => sourcesClient.change(sourceId, fields)),
    removeSource: (sourceId: number) => change(() => sourcesClient.remove(sourceId)),
    restoreSource: (sourceId: number) => change(() => sourcesClient.restore(sourceId)),
    makeOfRecord: (sourceId: number, setAsideReason: string) => change(() => sourcesClient.makeOfRecord(sourceId, setAsideReason)),
  }
})
