import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'
import { describeFailure } from '#server/http/describeFailure'

describe('a failure on its way to a person', () => {
  it('hides what it is not meant to know', () => {
    const { status, reply, unexpected } = describeFailure(new Error('SQLITE_ERROR: no such column passwort_hash'), 'request-1')
    expect({ status, unexpected }).toEqual({ status: 500, unexpected: true })
    expect(JSON.stringify(reply)).not.toContain('SQLITE')
    expect(reply.error.message).toContain('request-1')
    expect(describeFailure('thrown text', 'r').status).toBe(500)
  })

  it('carries the place and the particulars of what it can mend', () => {
    expect(describeFailure(new AppError('conflict', 'Changed.', { path: 'version', details: { current: 1 } }), 'r'))
      .toEqual({ status: 409, unexpected: false, reply: { error: { code: 'conflict', message: 'Changed.', path: 'version', details: { current: 1 } } } })
    expect(describeFailure(new AnalysisInputError('Unknown name.', 'expression', 6), 'r'))
      .toEqual({ status: 400, unexpected: false, reply: { error: { code: 'invalidInput', message: 'Unknown name.', path: 'expression', details: { position: 6 } } } })
  })
})
