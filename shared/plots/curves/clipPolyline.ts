import type { Rectangle } from './Rectangle'

/** A piece of a line: x, y, x, y ... in px. */
export type Polyline = number[]

/**
 * The pieces of a polyline that lie inside a rectangle, cut at its edges (Liang and Barsky, "A new concept and method for line clipping",
 * ACM Transactions on Graphics 3, 1984). A point that is not finite breaks the line.
 */
export function clipPolyline(xs: ArrayLike<number>, ys: ArrayLike<number>, rectangle: Rectangle): Polyline[] {
  const { x: left, y: top } = rectangle
  const right = left + rectangle.width
  const bottom = top + rectangle.height
  const pieces: Polyline[] = []
  let piece: Polyline | undefined
  for (let i = 1; i < xs.length; i++) {
    const x0 = xs[i - 1]!
    const y0 = ys[i - 1]!
    const dx = xs[i]! - x0
    const dy = ys[i]! - y0
    if (!Number.isFinite(dx) || !Number.isFinite(dy)) {
      piece = undefined
      continue
    }
    let enter = 0
    let leave = 1
    const edge = (direction: number, room: number): boolean => {
      if (direction === 0) return room >= 0
      const t = room / direction
      if (direction < 0) enter = Math.max(enter, t)
      else leave = Math.min(leave, t)
      return enter <= leave
    }
    if (!(edge(-dx, x0 - left) && edge(dx, right - x0) && edge(-dy, y0 - top) && edge(dy, bottom - y0))) {
      piece = undefined
      continue
    }
    if (!piece || enter > 0) {
      piece = [x0 + enter * dx, y0 + enter * dy]
      pieces.push(piece)
    }
    piece.push(x0 + leave * dx, y0 + leave * dy)
    if (leave < 1) piece = undefined
  }
  return pieces
}
