import { defineStore } from 'pinia'
import { systemsClient, type SystemFields } from '~/services/systemsClient'

/** The list of the systems that the person signed in has to do with. */
export const useSystemsStore = defineStore('systems', () => {
  const { value: systems, error, load } = useLoad(() => systemsClient.list())

  async function create(fields: SystemFields) {
    const system = await systemsClient.create(fields)
    await load()
    return system
  }

  async function importManifest(file: File) {
    const system = await systemsClient.importManifest(file)
    await load()
    return system
  }

  async function copy(systemId: number, name: string) {
    const system = await systemsClient.copy(systemId, name)
    await load()
    return system
  }

  async function remove(systemId: number) {
    await systemsClient.remove(systemId)
    await load()
  }

  async function restore(systemId: number) {
    await systemsClient.restore(systemId)
    await load()
  }

  return { systems, error, load, create, importManifest, copy, remove, restore }
})
