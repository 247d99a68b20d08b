import { AnalysisInputError } from '../AnalysisInputError'

/** Runs a step that works on one block: its faults, told by their place in the block, are told by their place in the input. */
export function atBlock<T>(name: string, step: () => T): T {
  try {
    return step()
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const { message, path, position } = error
    throw new AnalysisInputError(/^The block |^These blocks /.test(message) ? message : `Block ${name}: ${message}`, `blocks.${name}${path === '' ? '' : `.${path}`}`, position)
  }
}
