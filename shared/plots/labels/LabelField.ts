import type { Polyline } from '../curves/clipPolyline'
import type { Rectangle } from '../curves/Rectangle'

/** px */
const cell = 4

export interface PlacedLabel extends Rectangle {
  /** Whether it lies far enough from its mark to need a thin line to it. */
  needsLeader: boolean
}

export interface LabelRequest {
  /** the mark it belongs to, px */
  x: number
  y: number
  /** of the text, px */
  width: number
  height: number
  /** px from the mark to the nearest label. @default 7 */
  gap?: number
  /** px from the mark to the farthest. @default 70 */
  reach?: number
  /** Direction to try first, in degrees: 0 right, 90 up. @default 45 */
  prefer?: number
}

const turns = [0, 45, -45, 90, -90, 135, -135, 180, 22, -22, 67, -67, 112, -112, 157, -157]

/**
 * What of a figure is taken: curves, marks and labels, on a grid of small cells, so that a label finds the nearest free place.
 * Hard cells are never covered while another place is free; soft ones (tints, hairlines) are only avoided.
 */
export class LabelField {
  private readonly columns: number
  private readonly rows: number
  private readonly hard: Uint8Array
  private readonly soft: Uint8Array

  constructor(private readonly bounds: Rectangle) {
    this.columns = Math.ceil(bounds.width / cell)
    this.rows = Math.ceil(bounds.height / cell)
    this.hard = new Uint8Array(this.columns * this.rows)
    this.soft = new Uint8Array(this.columns * this.rows)
  }

  blockRectangle({ x, y, width, height }: Rectangle, soft = false): void {
    const grid = soft ? this.soft : this.hard
    const [c0, c1] = this.span(x - this.bounds.x, width, this.columns)
    const [r0, r1] = this.span(y - this.bounds.y, height, this.rows)
    for (let r = r0; r < r1; r++) grid.fill(1, r * this.columns + c0, r * this.columns + c1)
  }

  blockCircle(x: number, y: number, radius: number, soft = false): void {
    for (let dy = -radius; dy <= radius; dy += cell) {
      const half = Math.sqrt(Math.max(0, radius * radius - dy * dy))
      this.blockRectangle({ x: x - half, y: y + dy, width: 2 * half, height: 1 }, soft)
    }
  }

  blockPolylines(pieces: readonly Polyline[], soft = false): void {
    const grid = soft ? this.soft : this.hard
    for (const piece of pieces) {
      for (let i = 2; i + 1 < piece.length; i += 2) {
        const [x0, y0] = [piece[i - 2]!, piece[i - 1]!]
        const [dx, dy] = [piece[i]! - x0, piece[i + 1]! - y0]
        const steps = Math.max(1, Math.ceil(Math.max(Math.abs(dx), Math.abs(dy)) / (cell * 0.8)))
        for (let k = 0; k <= steps; k++) {
          const c = Math.floor((x0 + dx * k / steps - this.bounds.x) / cell)
          const r = Math.floor((y0 + dy * k / steps - this.bounds.y) / cell)
          if (c >= 0 && c < this.columns && r >= 0 && r < this.rows) grid[r * this.columns + c] = 1
        }
      }
    }
  }

  /** Whether the rectangle lies inside the figure and covers nothing hard. */
  isFree(rectangle: Rectangle): boolean {
    return this.inside(rectangle) && this.count(this.hard, rectangle, 1) === 0
  }

  /**
   * Takes the best place for a label near its mark: free, close, in the preferred direction.
   * Null where all places within reach cover something, unless `must`: then the place that covers least.
   */
  place(request: LabelRequest, must = false): PlacedLabel | null {
    const { x, y, width, height, gap = 7, reach = 70, prefer = 45 } = request
    let best: PlacedLabel | null = null
    let bestCost = Infinity
    for (let distance = gap; distance <= reach; distance += distance < gap + 8 ? 4 : 12) {
      for (let k = 0; k < turns.length; k++) {
        const angle = (prefer + turns[k]!) * Math.PI / 180
        const [ux, uy] = [Math.cos(angle), -Math.sin(angle)]
        // The label's nearest side or corner is `distance` from the mark.
        const rectangle = {
          x: x + ux * distance - width / 2 + sideways(ux) * width / 2,
          y: y + uy * distance - height / 2 + sideways(uy) * height / 2,
          width,
          height,
        }
        if (!this.inside(rectangle)) continue
        const covered = this.count(this.hard, rectangle, must ? Infinity : 1)
        if (covered > 0 && !must) continue
        const far = distance > gap + 8
        const leader = far ? this.countOnLine(x, y, rectangle, gap) : 0
        const cost = covered * 40 + this.count(this.soft, rectangle) * 0.6 + distance * 2 + k * 1.5 + leader * 12
        if (cost < bestCost) {
          bestCost = cost
          best = { ...rectangle, needsLeader: far }
        }
      }
      // Farther places cost more by their distance alone.
      if (best && bestCost <= distance * 2) break
    }
    if (best) this.blockRectangle(pad(best))
    return best
  }

  private inside({ x, y, width, height }: Rectangle): boolean {
    const { bounds } = this
    return x >= bounds.x && y >= bounds.y && x + width <= bounds.x + bounds.width && y + height <= bounds.y + bounds.height
  }

  private span(start: number, length: number, most: number): [number, number] {
    return [Math.min(most, Math.max(0, Math.floor(start / cell))), Math.max(0, Math.min(most, Math.ceil((start + length) / cell)))]
  }

  /** Taken cells under a rectangle, counted up to `enough`. */
  private count(grid: Uint8Array, rectangle: Rectangle, enough = Infinity): number {
    const [c0, c1] = this.span(rectangle.x - this.bounds.x, rectangle.width, this.columns)
    const [r0, r1] = this.span(rectangle.y - this.bounds.y, rectangle.height, this.rows)
    let taken = 0
    for (let r = r0; r < r1; r++) {
      for (let i = r * this.columns + c0; i < r * this.columns + c1; i++) taken += grid[i]!
      if (taken >= enough) break
    }
    return taken
  }

  /** Hard cells on the way from the mark to the label, but for those at the mark itself. */
  private countOnLine(x: number, y: number, rectangle: Rectangle, skip: number): number {
    const [tx, ty] = nearestPoint(rectangle, x, y)
    const length = Math.hypot(tx - x, ty - y)
    let taken = 0
    for (let at = skip; at < length; at += cell) {
      const c = Math.floor((x + (tx - x) * at / length - this.bounds.x) / cell)
      const r = Math.floor((y + (ty - y) * at / length - this.bounds.y) / cell)
      taken += this.hard[r * this.columns + c] ?? 0
    }
    return taken
  }
}

/** The point of a rectangle nearest to a place: where a leader ends. */
export function nearestPoint(rectangle: Rectangle, x: number, y: number): [number, number] {
  return [
    Math.min(rectangle.x + rectangle.width, Math.max(rectangle.x, x)),
    Math.min(rectangle.y + rectangle.height, Math.max(rectangle.y, y)),
  ]
}

function pad(rectangle: Rectangle): Rectangle {
  return { x: rectangle.x - 3, y: rectangle.y - 1, width: rectangle.width + 6, height: rectangle.height + 2 }
}

/** -1, 0, 1: on which side of the mark a label in this direction hangs. */
function sideways(component: number): number {
  return Math.max(-1, Math.min(1, component * 1.4))
}
