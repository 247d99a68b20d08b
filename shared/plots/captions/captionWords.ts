import { formatDistance } from '../../formatting/formatDistance'
import { formatFrequency } from '../../formatting/formatFrequency'
import type { FrequencyUnit, LoopAnalysis } from '../../types/analysis'
import type { FigureCurve } from '../FigureData'
import { hasMargins } from '../text/markWords'

/** '3 gain crossovers', '1 phase crossover', 'no closest approach'. */
export function countWords(count: number, noun: string): string {
  const plural = noun.endsWith('h') ? `${noun}es` : `${noun}s`
  if (count === 0) return `no ${noun}`
  return `${count} ${count === 1 ? noun : plural}`
}

/** 'The loop gain comes nearest to -1 at 81.50 rad/s, at a distance of 0.435.', with how that stands to the criterion. */
export function nearestWords(analysis: LoopAnalysis, required: number | null, unit: FrequencyUnit): string {
  const { vectorMargin } = analysis
  if (!vectorMargin) return ''
  const place = vectorMargin.frequency === 'infinity'
    ? 'towards infinite frequency'
    : vectorMargin.frequency === 0 ? 'at zero frequency' : `at ${formatFrequency(vectorMargin.frequency, unit)}`
  const nearest = `The loop gain comes nearest to −1 ${place}, at a distance of ${formatDistance(vectorMargin.distance)}`
  if (required === null || !hasMargins(analysis)) return `${nearest}.`
  return `${nearest}; required: ${formatDistance(required)}.`
}

/** A sentence for a loop whose closed loop is not stable, or of which that cannot be told; nothing for a stable one. */
export function stabilityWords(analysis: LoopAnalysis): string {
  switch (analysis.stability.verdict) {
    case 'stable': return ''
    case 'unstable': return 'The closed loop is unstable: distances to −1 are shown, and no margins.'
    case 'marginal': return 'The loop gain passes through −1: the closed loop is on the boundary of stability and has no margins.'
    case 'undetermined': return 'Whether the closed loop is stable cannot be told from the data: distances to −1 are shown, and no margins.'
  }
}

/** How measured data are drawn, where there are any. */
export function measuredWords({ samples, untrusted, analysis }: FigureCurve, inPlane: boolean): string {
  if (!samples) return ''
  const gaps = untrusted?.length ?? 0
  const noise = [...analysis.closestApproaches, ...analysis.phaseCrossovers].some(({ withinNoise }) => withinNoise) ? 'Small open marks lie within the noise.' : ''
  const points = inPlane ? 'Points are the measured samples, with their 95 % confidence discs where coherence was recorded.' : 'Points are the measured samples.'
  const trust = gaps > 0 ? `The line is dotted${inPlane ? '' : ' and the band hatched'} where the data cannot be trusted between samples.` : ''
  return sentences(points, trust, noise)
}

/** What the curves beside the main one are, and whose the marks are. */
export function otherCurvesWords([main, ...others]: readonly FigureCurve[]): string {
  if (main === undefined || others.length === 0) return ''
  const sources = others.filter(curve => !curve.isApproximation)
  const names = sources.map(({ name, samples }) => samples ? `${name} (measured, its samples marked)` : name)
  const listed = names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
  return sentences(
    sources.length === 0 ? '' : `${sources.length === 1 ? 'Broken line' : 'Broken lines'}: ${listed}; marks and words are those of ${main.name}.`,
    sources.length === others.length ? '' : 'Thin line: the continuous approximation.',
  )
}

/** Where the line ends short of the last crossing. */
export function drawnToWords({ curve: { drawnTo } }: FigureCurve, unit: FrequencyUnit): string {
  return drawnTo === undefined ? '' : `Beyond ${formatFrequency(drawnTo, unit)} the loop gain turns too often to be drawn: the line ends there, the marks go on.`
}

/** Where the axis of a sampled loop ends. */
export function halfSampleRateWords(frequency: number | undefined, unit: FrequencyUnit): string {
  return frequency === undefined ? '' : `The axis ends at half the sample rate, ${formatFrequency(frequency, unit)}.`
}

/** Sentences joined, empty ones left out. */
export function sentences(...parts: string[]): string {
  return parts.filter(part => part !== '').join(' ')
}
