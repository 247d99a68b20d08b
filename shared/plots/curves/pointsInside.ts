import type { Rectangle } from './Rectangle'

/** Those of the points (px) that lie in their panels. */
export function pointsInside(points: readonly (readonly [number, number, Rectangle])[]): { x: number, y: number }[] {
  return points
    .filter(([x, y, panel]) => x >= panel.x && x <= panel.x + panel.width && y >= panel.y && y <= panel.y + panel.height)
    .map(([x, y]) => ({ x, y }))
}
