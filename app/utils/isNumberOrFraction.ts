import { parseNumberText } from './parseNumberText'

/** Whether a text is a number or a fraction of two, as in '16384/32768'. */
export function isNumberOrFraction(text: string): boolean {
  const parts = text.split('/').map(parseNumberText)
  return parts.length <= 2 && parts.every(part => part !== null && !Number.isNaN(part)) && parts[1] !== 0
}
