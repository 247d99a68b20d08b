import { useStorage } from 'nitropack/runtime'
import type { ReportAssets } from './ReportAssets'

const keyOf = (...parts: string[]) => ['assets', ...parts].join(':').replaceAll('/', ':')

/** The files as the built server carries them inside itself (Nitro's server assets); in development they are read from their folders. */
export const readAssetsFromBundle = (): ReportAssets => ({
  template: async (path) => {
    const text = await useStorage().getItemRaw<string | Uint8Array>(keyOf('templates', 'report', path))
    if (text === null) throw new Error(`the report's template ${path} is missing from the built server`)
    return typeof text === 'string' ? text : Buffer.from(text).toString('utf8')
  },
  font: async (fontPackage, file) => {
    const bytes = await useStorage().getItemRaw<Uint8Array>(keyOf(fontPackage, file))
    if (bytes === null) throw new Error(`the font file ${file} is missing from the built server`)
    return Buffer.from(bytes)
  },
})
