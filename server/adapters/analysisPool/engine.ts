import type { AnalysisFailure, LoopAnalysis } from '#shared/types/analysis'

/** The engine's front door is not in this build yet: every input says so, and nothing is kept. */
export const engineVersion = 'none'
export const analyseEntry = (_value: unknown): LoopAnalysis | AnalysisFailure => ({ error: { message: 'The engine is not in this build yet.', path: '' } })
