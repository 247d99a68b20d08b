import { closeAnalysisPool } from '../adapters/analysisPool/analysisPool'

/** Ends the threads of the analysis pool with the server. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('close', () => closeAnalysisPool())
})
