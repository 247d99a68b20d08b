import type { SafeHtml } from '../text/SafeHtml'
import { safeHtml } from '../text/SafeHtml'
import type { Tone } from './ReportView'

const width = 64
const height = 9
/** A vector margin of this much fills the bar; few loops keep more. */
const fullScale = 1

const place = (value: number) => (Math.min(Math.max(value / fullScale, 0), 1) * (width - 2) + 1).toFixed(1)

/**
 * A vector margin as a short bar against its limit: the tint runs to the value, a solid mark stands at it, a dotted one at the limit.
 * Hidden from readers of the screen, for the number stands beside it.
 */
export function marginBar(value: number, limit: number | null, tone: Tone): SafeHtml {
  const limitMark = limit === null ? '' : `<line class="bar-limit" x1="${place(limit)}" x2="${place(limit)}" y1="0" y2="${height}"/>`
  return safeHtml(
    `<svg class="bar tone-${tone}" aria-hidden="true" viewBox="0 0 ${width} ${height}" width="${width}" height="${height}">`
    + `<rect class="bar-ground" x="0" y="2" width="${width}" height="5"/><rect class="bar-tint" x="0" y="2" width="${place(value)}" height="5"/>`
    + `${limitMark}<line class="bar-mark" x1="${place(value)}" x2="${place(value)}" y1="0" y2="${height}"/></svg>`,
  )
}
