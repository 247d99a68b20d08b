import type { FigureMark } from '../Figure'
import type { ClosestApproach, FrequencyUnit, GainCrossover, LoopAnalysis, PhaseCrossover } from '../../types/analysis'
import type { ApproachStyle } from './approachStyle'
import { approachStyle } from './approachStyle'
import { approachWords, gainCrossoverWords, hasMargins, phaseCrossoverWords } from '../text/markWords'

/** A crossing or closest approach of an analysis with the id and words of its mark; its place is the figure's to find. */
export type LoopMark = Omit<FigureMark, 'x' | 'y'> & { frequency: number | 'infinity' } & (
  | { kind: 'gain', crossing: GainCrossover }
  | { kind: 'phase', crossing: PhaseCrossover, faint: boolean }
  | { kind: 'approach', crossing: ClosestApproach, style: ApproachStyle }
)

/** All marks of an analysis in order of frequency, judged against a required vector margin; `prefix` stands before each id. */
export function loopMarks(analysis: LoopAnalysis, unit: FrequencyUnit, required: number | null, prefix = ''): LoopMark[] {
  const margins = hasMargins(analysis)
  const marks: LoopMark[] = [
    ...analysis.gainCrossovers.map((crossing, i): LoopMark =>
      ({ id: `${prefix}gain-${i}`, kind: 'gain', crossing, frequency: crossing.frequency, label: gainCrossoverWords(crossing, unit, margins) })),
    ...analysis.phaseCrossovers.map((crossing, i): LoopMark =>
      ({ id: `${prefix}phase-${i}`, kind: 'phase', crossing, faint: crossing.withinNoise === true, frequency: crossing.frequency, label: phaseCrossoverWords(crossing, unit, margins) })),
    ...analysis.closestApproaches.map((crossing, i): LoopMark =>
      ({ id: `${prefix}approach-${i}`, kind: 'approach', crossing, style: approachStyle(crossing, analysis, required), frequency: crossing.frequency, label: approachWords(crossing, unit, margins) })),
  ]
  const order = (mark: LoopMark) => mark.frequency === 'infinity' ? Infinity : mark.frequency
  return marks.sort((a, b) => order(a) - order(b) || (a.id < b.id ? -1 : 1))
}
