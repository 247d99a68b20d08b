import type { LoopAnalysis } from '#shared/types/analysis'
import { compareAnalysis, type OracleComparison } from './compareWithOracle'
import type { GeneratedTree } from './generateTree'
import { expressionOf } from './LoopTree'
import { treeAnswer } from './treeAnswer'

/** Analyses the typed expression of a generated tree over the whole axis and holds what lies in its band against the enclosures. */
export function compareWithTree(generated: GeneratedTree, analyse: (input: unknown) => LoopAnalysis): OracleComparison {
  const { tree, band, gainFloor, closedLoopUnstablePoles } = generated
  const truth = treeAnswer(tree, band, gainFloor)
  const analysis = analyse({ expression: expressionOf(tree), gainFloor })
  const exceptions = analysis.coverage.exceptions.map(e => `${e.from} .. ${e.to}: ${e.reason}`)
  if (truth.open.length > 0) return { differences: [], exceptions, setAside: truth.open }
  const inBand = <T extends { frequency: number | 'infinity' }>(list: T[]) => list.filter(f => f.frequency !== 'infinity' && f.frequency > band[0] && f.frequency < band[1])
  const least = truth.closestApproaches.reduce((d, m) => Math.min(d, m.distance), Number.POSITIVE_INFINITY)
  const vectorMargin = analysis.vectorMargin
  const differences = compareAnalysis(
    { ...analysis, gainCrossovers: inBand(analysis.gainCrossovers), phaseCrossovers: inBand(analysis.phaseCrossovers), closestApproaches: inBand(analysis.closestApproaches) },
    {
      ...truth, closedLoopUnstablePoles, openLoopUnstablePoles: null,
      // an end of the axis or a place outside the band may lie lower: then only "not above" can be said
      vectorMargin: vectorMargin && vectorMargin.distance <= least ? vectorMargin : { distance: least, frequency: 0 },
    }, gainFloor)
  const { openLoopUnstablePoles, encirclements, closedLoopUnstablePoles: counted } = analysis.stability
  if (openLoopUnstablePoles !== null && encirclements !== null && counted !== openLoopUnstablePoles - encirclements) differences.push('Z is not P - N')
  return { differences, exceptions, setAside: [] }
}
