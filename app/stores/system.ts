import { defineStore } from 'pinia'
import type { Criterion } from '#shared/types/criterion'
import { blocksClient, type BlockFields } from '~/services/blocksClient'
import { conditionsClient } from '~/services/conditionsClient'
import { loopsClient } from '~/services/loopsClient'
import { systemsClient, type ConditionFields, type LoopFields, type SystemDetail, type SystemFields } from '~/services/systemsClient'

/** The system that is open, with its loops, conditions and criteria; after each change they are read again. */
export const useSystemStore = defineStore('system', () => {
  const systemId = ref<number | null>(null)
  const { value: detail, error, load } = useLoad<SystemDetail | null>(async () => systemId.value === null ? null : systemsClient.read(systemId.value))

  /** Opens a system; one that is open already is only read again. */
  async function open(id: number): Promise<void> {
    if (systemId.value !== id) {
      systemId.value = id
      detail.value = null
    }
    await load()
  }

  /** Does the work on the open system, then reads it again. */
  async function change<Reply>(work: (id: number) => Promise<Reply>): Promise<Reply> {
    if (systemId.value === null) throw new Error('No system is open.')
    const reply = await work(systemId.value)
    await load()
    return reply
  }

  return {
    systemId, detail, error, load, open,
    changeSystem: (fields: SystemFields & { version: number }) => change(id => systemsClient.change(id, fields)),
    putCriteria: (criteria: Criterion[]) => change(id => systemsClient.putCriteria(id, criteria)),
    createLoop: (fields: LoopFields) => change(id => systemsClient.createLoop(id, fields)),
    copyLoop: (loopId: number, fields: { code: string, name: string }) => change(() => loopsClient.copy(loopId, fields)),
    removeLoop: (loopId: number) => change(() => loopsClient.remove(loopId)),
    restoreLoop: (loopId: number) => change(() => loopsClient.restore(loopId)),
    orderLoops: (ids: number[]) => change(id => systemsClient.orderLoops(id, ids)),
    createBlock: (fields: BlockFields) => change(id => blocksClient.create(id, fields)),
    changeBlock: (blockId: number, fields: Partial<BlockFields> & { version: number }) => change(() => blocksClient.change(blockId, fields)),
    removeBlock: (blockId: number) => change(() => blocksClient.remove(blockId)),
    restoreBlock: (blockId: number) => change(() => blocksClient.restore(blockId)),
    orderBlocks: (ids: number[]) => change(id => blocksClient.order(id, ids)),
    createCondition: (fields: ConditionFields) => change(id => systemsClient.createCondition(id, fields)),
    changeCondition: (conditionId: number, fields: ConditionFields & { version: number }) => change(() => conditionsClient.change(conditionId, fields)),
    copyCondition: (conditionId: number, fields: { code: string, name: string }) => change(() => conditionsClient.copy(conditionId, fields)),
    removeCondition: (conditionId: number) => change(() => conditionsClient.remove(conditionId)),
    restoreCondition: (conditionId: number) => change(() => conditionsClient.restore(conditionId)),
    orderConditions: (ids: number[]) => change(id => systemsClient.orderConditions(id, ids)),
  }
})
