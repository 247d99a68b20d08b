import type { LoopAnalysis } from '#shared/types/analysis'
import { blocksOfTree } from './blocksOfTree'
import { compareAnalysis, type OracleComparison } from './compareWithOracle'
import { exactAnswer } from './exactAnswer'
import { exactLoopOfTree } from './exactLoopOfTree'
import type { GeneratedRationalTree } from './generateRationalTree'
import { expressionOf } from './LoopTree'

/** Analyses a rational tree, typed as one expression and again built from blocks, and holds both against exact arithmetic on the tree multiplied out. */
export function compareWithRationalTree({ tree, gainFloor, sampleTime }: GeneratedRationalTree, analyse: (input: unknown) => LoopAnalysis): OracleComparison {
  const truth = exactAnswer(exactLoopOfTree(tree, sampleTime), gainFloor)
  const text = expressionOf(tree)
  const analysis = analyse({ expression: sampleTime === undefined ? text : text.replaceAll(/\bs\b/g, 'z'), gainFloor, ...sampleTime === undefined ? {} : { sampleTime } })
  const exceptions = analysis.coverage.exceptions.map(e => `${e.from} .. ${e.to}: ${e.reason}`)
  if (truth.ties.length > 0) return { differences: [], exceptions, setAside: truth.ties }
  const overBlocks = analyse({ ...blocksOfTree(tree, sampleTime), gainFloor })
  const differences = [...compareAnalysis(analysis, truth, gainFloor), ...compareAnalysis(overBlocks, truth, gainFloor).map(words => `over blocks: ${words}`)]
  return { differences, exceptions: [...exceptions, ...overBlocks.coverage.exceptions.map(e => `over blocks: ${e.from} .. ${e.to}: ${e.reason}`)], setAside: [] }
}
