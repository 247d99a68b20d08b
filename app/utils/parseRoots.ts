import type { ComplexPair } from '#shared/types/analysis'
import { parseNumberText } from './parseNumberText'

const number = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?`
const single = new RegExp(`^(${number})(?:[ ,;]+(${number}))?$`, 'i')
const pair = new RegExp(String.raw`^(${number})\s*(?:±|\+-|\+/-)\s*[ij]?\s*(${number})\s*[ij]?$`, 'i')
const imaginary = new RegExp(String.raw`^(${number})\s*([+-])\s*[ij]?\s*((?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?)\s*[ij]?$`, 'i')

/**
 * Zeros or poles typed one a line: '-2' real, '-1 3' real and imaginary part, '-1 ± 3' (or '-1 +- 3') both of a conjugate pair, '-1 + 3j'.
 * @throws RangeError naming the line that is none of these.
 */
export function parseRoots(text: string): ComplexPair[] {
  return text.split('\n').flatMap((line, index): ComplexPair[] => {
    const typed = line.trim().replace(/[−–]/g, '-')
    if (typed === '') return []
    const both = pair.exec(typed)
    if (both) return [[value(both[1]), value(both[2])], [value(both[1]), -value(both[2])]]
    const one = single.exec(typed)
    if (one) return [[value(one[1]), one[2] === undefined ? 0 : value(one[2])]]
    const sum = imaginary.exec(typed)
    if (sum) return [[value(sum[1]), (sum[2] === '-' ? -1 : 1) * value(sum[3])]]
    throw new RangeError(`Line ${index + 1}, '${typed.slice(0, 40)}', is no root. Write '-2', '-1 3' or '-1 ± 3'.`)
  })
}

const value = (text: string | undefined) => parseNumberText(text ?? '') ?? 0
