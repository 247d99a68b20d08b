import type { Polyline } from './clipPolyline'

/** A coordinate to a tenth of a px, a fortieth of a millimetre on paper. */
function tenth(value: number): string {
  return String(Math.round(value * 10) / 10 + 0)
}

/** Path data of polylines; neighbours that fall on the same tenth of a px are written once. */
export function pathData(pieces: readonly Polyline[], closed = false): string {
  let d = ''
  for (const piece of pieces) {
    let last = ''
    for (let i = 0; i + 1 < piece.length; i += 2) {
      const point = `${tenth(piece[i]!)} ${tenth(piece[i + 1]!)}`
      if (point === last) continue
      d += i === 0 ? `M${point}` : `L${point}`
      last = point
    }
    if (closed) d += 'Z'
  }
  return d
}
