import type { Stability } from '../../types/analysis'
import type { FactoredLoop } from '../FactoredLoop'
import { closedLoopUnstableCount } from '../factors/closedLoopUnstableCount'
import type { LowestDistance } from '../margins/findLowestDistance'
import type { SearchResult } from '../search/searchLoop'
import { countEncirclements } from './countEncirclements'

/**
 * The closed-loop verdict of a model: Z = P - N by counted encirclements, checked by the closed-loop poles where there is no dead time.
 * Both must agree, or the verdict is undetermined with the reason. -1 on the locus to within rounding comes before any count.
 */
export function judgeStability(loop: FactoredLoop | null, result: SearchResult, lowest: LowestDistance): Stability {
  const { axis } = result
  const openLoopUnstablePoles = axis.unstablePoles
  const base = { basis: 'counted' as const, openLoopUnstablePoles }
  const hidden = describeHidden(result)
  if (lowest.distance <= lowest.rounding) {
    return {
      ...base, verdict: 'marginal', encirclements: null, closedLoopUnstablePoles: null,
      reason: joined('L meets -1 to within rounding', hidden),
    }
  }
  if (axis.extension?.openReason) {
    return {
      basis: 'counted', openLoopUnstablePoles: null, verdict: 'undetermined', encirclements: null, closedLoopUnstablePoles: null,
      reason: joined(axis.extension.openReason, hidden),
    }
  }
  const gainAtInfinity = result.infinity.logGain
  if (result.endless && gainAtInfinity > 0 && !result.infinity.unity) {
    return {
      ...base, verdict: 'unstable', encirclements: null, closedLoopUnstablePoles: null,
      reason: joined('with dead time and a gain above 1 at infinity the closed loop has endlessly many unstable poles', hidden),
    }
  }
  const { encirclements, reason } = countEncirclements(result)
  const roots = loop && closedLoopUnstableCount(loop)
  if (encirclements === null) {
    return { ...base, verdict: 'undetermined', encirclements, closedLoopUnstablePoles: null, reason: joined(reason!, hidden) }
  }
  const closedLoopUnstablePoles = openLoopUnstablePoles - encirclements
  const counted = { ...base, encirclements, closedLoopUnstablePoles }
  if (closedLoopUnstablePoles < 0) {
    return {
      ...counted, verdict: 'undetermined', closedLoopUnstablePoles: null,
      reason: joined(`the count gives ${closedLoopUnstablePoles} unstable closed-loop poles, which cannot be`, hidden),
    }
  }
  // A root so near the boundary that it counts as on it may lie on either side.
  if (roots && roots.certain && (closedLoopUnstablePoles < roots.count || closedLoopUnstablePoles > roots.count + roots.boundary)) {
    return {
      ...counted, verdict: 'undetermined',
      reason: joined(`the encirclements give ${closedLoopUnstablePoles} unstable closed-loop poles, the roots of the closed loop ${roots.count}`, hidden),
    }
  }
  if (closedLoopUnstablePoles > 0) return { ...counted, verdict: 'unstable', ...(hidden ? { reason: hidden } : {}) }
  if (axis.cancelled.some(root => root.onBoundary)) return { ...counted, verdict: 'marginal', reason: hidden! }
  return { ...counted, verdict: 'stable', ...(hidden ? { reason: hidden } : {}) }
}

/** Tells poles on or beyond the boundary that a zero cancels: they stay in the closed loop, whatever the locus does. */
function describeHidden({ axis }: SearchResult): string | undefined {
  if (axis.cancelled.length === 0) return undefined
  const places = axis.cancelled.map(({ re, im, onBoundary }) =>
    `${axis.sampleTime === undefined ? 's' : 'z'} = ${format(re)}${im === 0 ? '' : ` +- j${format(im)}`}${onBoundary ? ' (on the stability boundary)' : ''}`)
  return `hidden cancellation: a zero cancels the unstable pole at ${places.join(', ')}, which the loop cannot move and the closed loop keeps`
}

function format(value: number): string {
  return String(Number(value.toPrecision(6)))
}

function joined(first: string, second: string | undefined): string {
  return second ? `${first}; ${second}` : first
}
