import { AppError } from '#shared/errors/AppError'
import { findFaultyKey } from '#shared/importers/findFaultyKey'

/**
 * The data of a JSON text, with or without the mark some editors put before it. Throws 'invalid input' saying in which line and column it stops being one, or where
 * a key stands twice.
 */
export function parseManifestText(text: string): unknown {
  const unmarked = text.replace(/^\uFEFF/, '')
  const data = parse(unmarked)
  const faulty = findFaultyKey(unmarked)
  if (faulty === null) return data
  const { line, column } = placeIn(unmarked, faulty.position)
  throw new AppError('invalidInput', `Line ${line}, column ${column}: ${faulty.message}`, { details: { line, column } })
}

function parse(text: string): unknown {
  try {
    return JSON.parse(text) as unknown
  }
  catch (cause) {
    const [, digits] = /at position (\d+)/.exec((cause as Error).message) ?? []
    const { line, column } = placeIn(text, digits === undefined ? text.length : Number(digits))
    throw new AppError('invalidInput', `This is no JSON text: it cannot be read on from line ${line}, column ${column}.`, { cause, details: { line, column } })
  }
}

function placeIn(text: string, position: number): { line: number, column: number } {
  const before = text.slice(0, position)
  return { line: before.split('\n').length, column: before.length - before.lastIndexOf('\n') }
}
