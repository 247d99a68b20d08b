import type { AnalysisFailure, LoopAnalysis } from '../types/analysis'
import { AnalysisInputError } from './AnalysisInputError'
import { analyseLoop } from './analyseLoop'
import { readLoopInput } from './readLoopInput'

export type EntryResult = LoopAnalysis | AnalysisFailure

export interface EntryOptions {
  /** Told of an error that is no fault of the input (a fault of the engine), before it is put in the entry's place. */
  onFault?: (error: unknown) => void
}

function analyseEntry(value: unknown, options: EntryOptions): EntryResult {
  try {
    return analyseLoop(readLoopInput(value))
  }
  catch (error) {
    if (error instanceof AnalysisInputError) {
      return { error: { message: error.message, path: error.path, ...(error.position === undefined ? {} : { position: error.position }) } }
    }
    options.onFault?.(error)
    return { error: { message: 'the analysis broke off by a fault of the engine; the input may be in order', path: '' } }
  }
}

/**
 * The front door of the command line and of `POST /api/analyses`: one entry of the contract gives one result, a list gives a list in the same
 * order. An entry that cannot be analysed gives `{ error: { message, path } }` in its place; the others are still analysed.
 */
export function analyseEntries(value: unknown, options: EntryOptions = {}): EntryResult | EntryResult[] {
  return Array.isArray(value) ? value.map(entry => analyseEntry(entry, options)) : analyseEntry(value, options)
}

/** True where an entry, or an entry of the list, could not be analysed. */
export function hasFailure(result: EntryResult | EntryResult[]): boolean {
  return Array.isArray(result) ? result.some(hasFailure) : 'error' in result
}
