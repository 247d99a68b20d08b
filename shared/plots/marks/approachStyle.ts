import type { ClosestApproach, LoopAnalysis } from '../../types/analysis'
import { hasMargins } from '../text/markWords'
import { nearestEnd } from './nearestEnd'
import type { PlotTheme } from '../theme'

/**
 * How a closest approach is drawn: the nearest of all, one under the criterion, one that meets it, or one that is no deeper than the noise of its
 * measurement.
 */
export type ApproachStyle = 'nearest' | 'under' | 'clear' | 'faint'

/** The nearest of all approaches; null where there is none, or where an end of the axis is nearer. */
function nearestApproach(analysis: LoopAnalysis): ClosestApproach | null {
  const { closestApproaches: [first, ...others] } = analysis
  if (!first || nearestEnd(analysis)) return null
  return others.reduce((a, b) => b.distance < a.distance ? b : a, first)
}

/** Style of one approach of an analysis; one of a loop that is not stable is not judged against the required vector margin. */
export function approachStyle(approach: ClosestApproach, analysis: LoopAnalysis, required: number | null): ApproachStyle {
  if (approach === nearestApproach(analysis)) return 'nearest'
  if (approach.withinNoise) return 'faint'
  return isUnder(approach, analysis, required) ? 'under' : 'clear'
}

/** Whether an approach of a stable loop is nearer than the required vector margin. */
export function isUnder(approach: ClosestApproach, analysis: LoopAnalysis, required: number | null): boolean {
  return required !== null && approach.distance < required && hasMargins(analysis)
}

/** Colour of the number beside an approach. */
export function approachColour(style: ApproachStyle, theme: PlotTheme): string {
  return { nearest: theme.magenta, under: theme.unmet, clear: theme.ink, faint: theme.slate }[style]
}
