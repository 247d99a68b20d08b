import { parseTimeText } from './parseTimeText'
import { timeAsTyped } from './timeAsTyped'

/** A stored time as it stands in a field: with its unit where that reads back as the very same number. */
export function timeText(seconds: number | undefined): string {
  if (seconds === undefined) return ''
  const text = timeAsTyped(seconds)
  return parseTimeText(text) === seconds ? text : String(seconds)
}
