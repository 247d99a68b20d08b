const datePattern = /\/(CreationDate|ModDate) \(D:\d{14}[+-]\d{2}'\d{2}'\)/g

/**
 * A PDF of Chromium with both its dates set to `time` (UTC). The replacement has the same length, so the cross-reference table stays true.
 * Throws a RangeError where the two dates are not found as Chromium writes them.
 */
export function setPdfDates(pdf: Uint8Array, time: Date): Buffer {
  const stamp = time.toISOString().replace(/\D/g, '').slice(0, 14)
  let found = 0
  const text = Buffer.from(pdf).toString('latin1').replace(datePattern, (_, key: string) => {
    found += 1
    return `/${key} (D:${stamp}+00'00')`
  })
  if (found !== 2 || text.length !== pdf.length) throw new RangeError(`expected the two dates of a PDF, found ${found}`)
  return Buffer.from(text, 'latin1')
}
