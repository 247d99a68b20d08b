/**
 * What a vector margin d = min |1 + L| implies at the least: the gain may rise by 1/(1 - d) (null: any amount, for d >= 1) or fall by
 * 1/(1 + d), or the phase turn by 2 asin(d/2). dB and degrees. Closed forms: the disc of radius d about -1 holds no point of L.
 */
export function impliedMargins(d: number): { impliedGainIncrease: number | null, impliedGainDecrease: number, impliedPhase: number } {
  return {
    impliedGainIncrease: d >= 1 ? null : -20 * Math.log10(1 - d),
    impliedGainDecrease: -20 * Math.log10(1 + d),
    impliedPhase: 2 * Math.asin(Math.min(1, d / 2)) * 180 / Math.PI,
  }
}
