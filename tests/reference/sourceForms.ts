import type { CoefficientsInput, ExpressionInput, LoopInput, ZerosPolesInput } from '#shared/types/analysis'
import { zerosPolesOf } from '../oracle/exactRoots'

/** A polynomial as a typed expression: every coefficient to its last bit. */
function polynomialText(highestFirst: number[], variable: string): string {
  return highestFirst.map((c, i) => {
    const power = highestFirst.length - 1 - i
    return power === 0 ? `(${c})` : power === 1 ? `(${c})*${variable}` : `(${c})*${variable}^${power}`
  }).join(' + ')
}

/** The coefficient form and the same loop as zeros, poles and gain (correctly rounded roots) and as an expression. */
export function sourceForms(coefficients: CoefficientsInput): Record<'coefficients' | 'zeros-poles-gain' | 'expression', LoopInput> {
  const { numerator, denominator, deadTime, sampleTime, ...common } = coefficients
  const variable = sampleTime === undefined ? 's' : 'z'
  const roots: ZerosPolesInput = {
    ...common, ...zerosPolesOf({ numerator, denominator }),
    ...deadTime === undefined ? {} : { deadTime }, ...sampleTime === undefined ? {} : { sampleTime },
  }
  const dead = deadTime ? `*exp(-s*deadTime)` : ''
  const expression: ExpressionInput = {
    ...common,
    expression: `(${polynomialText(numerator, variable)})/(${polynomialText(denominator, variable)})${dead}`,
    ...deadTime ? { parameters: { deadTime } } : {}, ...sampleTime === undefined ? {} : { sampleTime },
  }
  return { 'coefficients': coefficients, 'zeros-poles-gain': roots, expression }
}
