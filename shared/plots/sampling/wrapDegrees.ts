/** An angle in degrees, wrapped into (-180, 180]. */
export function wrapDegrees(angle: number): number {
  const wrapped = angle - 360 * Math.round(angle / 360)
  return wrapped <= -180 ? wrapped + 360 : wrapped
}
