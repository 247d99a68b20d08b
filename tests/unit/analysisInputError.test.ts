import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'

describe('AnalysisInputError', () => {
  it('names the field at fault and, for an expression, the character', () => {
    const error = new AnalysisInputError('unknown name "wq"', 'expression', 7)
    expect([error.message, error.path, error.position]).toEqual(['unknown name "wq"', 'expression', 7])
  })
})
