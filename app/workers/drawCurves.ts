import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { approximateLoopGain } from '#shared/analysis/sampling/approximateLoopGain'
import { buildLoopFigureData, type CurveSource } from '#shared/plots/buildLoopFigureData'
import { curveSourceOf } from '#shared/plots/curveSourceOf'
import type { LoopFigureData } from '#shared/plots/FigureData'
import type { LoopAnalysis, LoopInput } from '#shared/types/analysis'

export interface DrawRequest {
  title: string
  requiredVectorMargin: number | null
  /** the main one first; where its analysis was compared with the continuous approximation, that is drawn beside it */
  curves: [DrawnCurve, ...DrawnCurve[]]
}

export interface DrawnCurve {
  name: string
  input: LoopInput
  analysis: LoopAnalysis
}

/** The figures of a loop that was analysed before, with other sources of it beside the main one. */
export function drawCurves({ title, requiredVectorMargin, curves: [first, ...others] }: DrawRequest): LoopFigureData {
  return buildLoopFigureData({ title, requiredVectorMargin, curves: [curveSource(first), ...approximationOf(first), ...others.map(curveSource)] })
}

const curveSource = ({ name, input, analysis }: DrawnCurve): CurveSource => curveSourceOf(name, input, analysis, prepareLoopGain(input))

function approximationOf({ input, analysis }: DrawnCurve): CurveSource[] {
  if (!analysis.structure?.approximated || !('expression' in input)) return []
  const gain = approximateLoopGain(input)
  return gain === null ? [] : [{ ...curveSourceOf('continuous approximation', input, analysis, gain), isApproximation: true }]
}
