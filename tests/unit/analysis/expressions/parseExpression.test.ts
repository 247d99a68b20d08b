import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { parseExpression } from '#shared/analysis/expressions/parseExpression'

const inS = { variable: 's' as const, parameterNames: ['wz', 'T', 'k_1'] }
const inZ = { variable: 'z' as const, parameterNames: ['k'] }

/** [start of the message, position] of the refusal, null when the text is read. */
const refusal = (text: string, names: Parameters<typeof parseExpression>[1] = inS) => {
  try {
    parseExpression(text, names)
  }
  catch (error) {
    if (error instanceof AnalysisInputError) {
      expect(error.path).toBe('expression')
      return [error.message, error.position]
    }
    throw error
  }
  return null
}

describe('parseExpression', () => {
  it.each([
    ['', 'The expression is empty', 0],
    ['   ', 'The expression is empty', 0],
    ['25*(s+wq)', 'Unknown name "wq"', 6],
    ['1/(s+1', 'This bracket is not closed', 2],
    ['1/s+1)', 'This closing bracket has no opening one', 5],
    ['1/()', 'These brackets are empty', 2],
    ['1/(s+)', 'Something is missing after "+"', 4],
    ['1/s+', 'Something is missing after "+"', 3],
    ['*s', 'Something is missing before "*"', 0],
    ['s*/2', 'Something is missing between "*" and "/"', 2],
    ['s**2', 'Write powers with ^', 2],
    ['2/sqrt(s)', 'The function "sqrt" cannot be used here', 2],
    ['sin(s)', 'The function "sin" cannot be used here', 0],
    ['1/s^2.5', 'The power 2.5 is not a whole number', 4],
    ['s^(1/2)', 'The power 0.5 is not a whole number', 5],
    ['s^wz', 'A power must be a whole number written out', 2],
    ['s^s', 'A power must be a whole number written out', 2],
    ['(s+1)^51', 'The power 51 is too large', 6],
    ['exp(-s^2)', 'The argument of exp must be -s*T', 5],
    ['exp(-T)', 'The argument of exp must be -s*T', 5],
    ['exp(-s*T+1)', 'The argument of exp must be -s*T', 5],
    ['exp(-s/s)', 'The argument of exp must be -s*T', 7],
    ['exp(-s*exp(-s))', 'The argument of exp must be -s*T', 5],
    ['exp', 'exp needs an argument in brackets', 0],
    ['s(s+1)', 'A multiplication sign is missing: write s*( ... )', 1],
    ['wz(s+1)', 'A multiplication sign is missing: write wz*( ... )', 0],
    ['1/2s', 'A multiplication sign is missing here', 3],
    ['1/(s+1)(s+2)', 'A multiplication sign is missing here', 7],
    ['1/-2(s+1)', 'A multiplication sign is missing here', 4],
    ['2 3', 'An operator is missing', 2],
    ['s s', 'An operator is missing', 2],
    ['1,5*s', 'A comma has no meaning here', 1],
    ['[1, 2]', 'Only round brackets', 0],
    ['s = 3', 'The character "=" has no meaning here', 2],
    ['1;s', 'The character ";" has no meaning here', 1],
    ['s!', 'The character "!" has no meaning here', 1],
    ['"s"', 'The character """ has no meaning here', 0],
    ['s.re', 'The character "." has no meaning here', 1],
    ['1e400/s', 'The number 1e400 is too large', 0],
    ['z/(z-1)', 'This loop is continuous: its variable is s', 0],
    ['i*s', 'Complex coefficients are not covered', 0],
    ['constructor(1)', 'The function "constructor" cannot be used here', 0],
    ['__proto__', 'Unknown name "__proto__"', 0],
    ['s mod 2', 'An operator is missing', 2],
  ])('refuses %j at the place where the fault stands', (text, message, position) => {
    const [said, at] = refusal(text) ?? []
    expect(said).toContain(message)
    expect(at).toBe(position)
  })

  it('knows only z, and no exp, in a sampled loop', () => {
    expect(refusal('k*z^-1/(1-z^-1)', inZ)).toBeNull()
    expect(refusal('1/s', inZ)?.[0]).toContain('its variable is z, not s')
    expect(refusal('exp(-z*2)/z', inZ)?.[0]).toContain('exp has no place in a sampled loop')
  })

  it('refuses 10,000 characters, endless brackets and signs, and an expression that never ends, in bounded time', () => {
    expect(refusal('s+'.repeat(5000))?.[0]).toContain('at most 8000 are read')
    expect(refusal('('.repeat(4000) + 's' + ')'.repeat(3999))?.[0]).toContain('nested more than 60 deep')
    expect(refusal('-'.repeat(4000) + 's')?.[0]).toContain('Too many signs')
    expect(refusal('s+'.repeat(3000) + 's')?.[0]).toContain('more than 4000 parts')
    expect(refusal('s^2'.repeat(2000))).not.toBeNull()
  })

  it('reads precedence as it is written on paper: -s^2 is -(s^2), 2^3^2 is 2^9, a/b/c is (a/b)/c', () => {
    expect(parseExpression('-s^2', inS)).toMatchObject({ kind: 'negate', operand: { kind: 'power', exponent: 2 } })
    expect(parseExpression('s^2^3', inS)).toMatchObject({ kind: 'power', exponent: 8 })
    expect(parseExpression('wz/s/T', inS)).toMatchObject({ kind: 'divide', left: { kind: 'divide' }, right: { name: 'T' } })
  })

  it('reads the multiplications that are left out in 2s, 3(s+1) and (s+1)(s+2)', () => {
    expect(parseExpression('2s', inS)).toEqual(expect.objectContaining({ kind: 'multiply' }))
    expect(parseExpression('3(s+1)(s+2)', inS)).toMatchObject({ kind: 'multiply', left: { kind: 'multiply' } })
  })

  it.each(['exp(-s*T)', 'exp(-T*s)', 'exp(-s*(T+wz))', 'exp(-0.01*s)', 'exp(s*(-T))', 'exp(-s*T/2)', 'exp(-(s*T))', 'exp(-s)^2*exp(-s*T)', 'pi*k_1*exp(-s*0)'])(
    'reads dead time written as %s', (text) => {
      expect(refusal(text)).toBeNull()
    })

  it('takes a parameter named as a word of the parser as a parameter', () => {
    expect(refusal('mod*s', { variable: 's', parameterNames: ['mod'] })).toBeNull()
    expect(refusal('in+true', { variable: 's', parameterNames: ['in', 'true'] })).toBeNull()
  })
})
