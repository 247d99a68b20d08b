/** An angle in degrees wrapped into (-180, 180]. */
export function wrapDegrees(angle: number): number {
  const turns = Math.ceil((angle - 180) / 360)
  return angle - 360 * turns + 0
}
