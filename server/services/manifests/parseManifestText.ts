import { AppError } from '#shared/errors/AppError'

/** The data of a JSON text, with or without the mark some editors put before it; throws 'invalid input' saying in which line and column it stops being one. */
export function parseManifestText(text: string): unknown {
  const unmarked = text.replace(/^\uFEFF/, '')
  try {
    return JSON.parse(unmarked) as unknown
  }
  catch (cause) {
    const [, digits] = /at position (\d+)/.exec((cause as Error).message) ?? []
    const before = digits === undefined ? unmarked : unmarked.slice(0, Number(digits))
    const line = before.split('\n').length
    const column = before.length - before.lastIndexOf('\n')
    throw new AppError('invalidInput', `This is no JSON text: it cannot be read on from line ${line}, column ${column}.`, { cause, details: { line, column } })
  }
}
