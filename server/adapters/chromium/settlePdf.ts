const datePattern = /\/(CreationDate|ModDate) \(D:\d{14}[+-]\d{2}'\d{2}'\)/g
const cellName = /\(node(\d{8})\)/g

/** Names of table cells in the tags, numbered by Chromium's own count of nodes, which differs from run to run: renumbered in the same order. */
function renumberCells(text: string): string {
  const numbers = [...new Set([...text.matchAll(cellName)].map(match => match[1] ?? ''))].sort()
  const rank = new Map(numbers.map((number, index) => [number, String(index + 1).padStart(8, '0')]))
  return text.replace(cellName, (whole, number: string) => `(node${rank.get(number) ?? number})`)
}

/**
 * A PDF of Chromium with what depends on the moment of printing settled: both its dates are `time` (UTC), and the names of table cells
 * are counted from one. Every replacement has the same length, so the cross-reference table stays true.
 * Throws a RangeError where the two dates are not found as Chromium writes them.
 */
export function settlePdf(pdf: Uint8Array, time: Date): Buffer {
  const stamp = time.toISOString().replace(/\D/g, '').slice(0, 14)
  let found = 0
  const dated = Buffer.from(pdf).toString('latin1').replace(datePattern, (_, key: string) => {
    found += 1
    return `/${key} (D:${stamp}+00'00')`
  })
  const text = renumberCells(dated)
  if (found !== 2 || text.length !== pdf.length) throw new RangeError(`expected the two dates of a PDF, found ${found}`)
  return Buffer.from(text, 'latin1')
}
