import { defineStore } from 'pinia'
import type { Board } from '#shared/types/system'
import { systemsClient } from '~/services/systemsClient'

/** The board of one system: every loop in every condition by its source of record. */
export const useBoardStore = defineStore('board', () => {
  const systemId = ref<number | null>(null)
  const { value: board, error, load } = useLoad<Board | null>(async () => systemId.value === null ? null : systemsClient.board(systemId.value))

  async function open(id: number): Promise<void> {
    if (systemId.value !== id) {
      systemId.value = id
      board.value = null
    }
    await load()
  }

  return { board, error, load, open }
})
