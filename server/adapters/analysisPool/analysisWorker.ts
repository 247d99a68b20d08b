import { analyseEntry } from './engine'

/** What each thread of the pool runs: one entry of the contract in, its analysis or the reason why there is none out. */
export default (value: unknown) => analyseEntry(value)
