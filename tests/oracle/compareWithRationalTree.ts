import type { LoopAnalysis } from '#shared/types/analysis'
import { compareAnalysis, type OracleComparison } from './compareWithOracle'
import { exactAnswer } from './exactAnswer'
import { exactLoopOfTree } from './exactLoopOfTree'
import type { GeneratedRationalTree } from './generateRationalTree'
import { expressionOf } from './LoopTree'

/** Analyses the typed expression of a rational tree and holds it against exact arithmetic on the tree multiplied out. */
export function compareWithRationalTree({ tree, gainFloor, sampleTime }: GeneratedRationalTree, analyse: (input: unknown) => LoopAnalysis): OracleComparison {
  const truth = exactAnswer(exactLoopOfTree(tree, sampleTime), gainFloor)
  const text = expressionOf(tree)
  const analysis = analyse({ expression: sampleTime === undefined ? text : text.replaceAll(/\bs\b/g, 'z'), gainFloor, ...sampleTime === undefined ? {} : { sampleTime } })
  const exceptions = analysis.coverage.exceptions.map(e => `${e.from} .. ${e.to}: ${e.reason}`)
  if (truth.ties.length > 0) return { differences: [], exceptions, setAside: truth.ties }
  return { differences: compareAnalysis(analysis, truth, gainFloor), exceptions, setAside: [] }
}
