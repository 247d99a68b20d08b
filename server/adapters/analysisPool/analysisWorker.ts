import { analyseEntries } from '#shared/analysis/analyseEntries'

/** What each thread of the pool runs: one entry of the contract in, its analysis or the reason why there is none out. */
export default (value: unknown) => analyseEntries(value, { onFault: error => console.error('The engine broke off:', error) })
