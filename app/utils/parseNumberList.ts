import { parseNumberText } from './parseNumberText'

/**
 * Numbers typed one after the other, separated by spaces, commas, semicolons or line ends, in brackets or not.
 * @throws RangeError naming the entry that is no number, and its place.
 */
export function parseNumberList(text: string): number[] {
  const entries = text.replace(/[[\]()]/g, ' ').split(/[\s,;]+/).filter(entry => entry !== '')
  return entries.map((entry, index) => {
    const value = parseNumberText(entry)
    if (value === null || Number.isNaN(value)) throw new RangeError(`'${entry}', entry ${index + 1}, is not a number. Write it like 12.5 or 1.2e3, with spaces between.`)
    return value
  })
}
