import type { SourceDefinition, SourceKind } from '#shared/types/source'
import { significantDigits } from '#shared/formatting/significantDigits'

export const kindNames: Record<SourceKind, string> = {
  coefficients: 'model, coefficients',
  zerosPoles: 'model, zeros, poles and gain',
  expression: 'model, expression',
  measured: 'measured response',
}

/** Characters of a definition that are printed; the package holds the whole. */
const printedLength = 700

const figure = (value: number) => String(Number(value.toPrecision(10)))
const rootText = ([re, im]: readonly [number, number]) => (im === 0 ? figure(re) : `${figure(re)} ${im < 0 ? '\u2212' : '+'} ${figure(Math.abs(im))}j`)
const list = (values: readonly string[]) => (values.length === 0 ? 'none' : values.join(', '))

function timing({ deadTime, sampleTime }: { deadTime?: number, sampleTime?: number }): string[] {
  return [
    ...(deadTime ? [`dead time ${significantDigits(deadTime * 1000)} ms`] : []),
    ...(sampleTime ? [`sample time ${significantDigits(sampleTime * 1000)} ms`] : []),
  ]
}

function partsOf(definition: SourceDefinition): string[] {
  switch (definition.kind) {
    case 'expression':
      return [`L(${definition.sampleTime ? 'z' : 's'}) = ${definition.expression}`, ...timing(definition)]
    case 'coefficients':
      return [`numerator ${list(definition.numerator.map(figure))}`, `denominator ${list(definition.denominator.map(figure))}`, ...timing(definition)]
    case 'zerosPoles':
      return [`zeros ${list(definition.zeros.map(rootText))}`, `poles ${list(definition.poles.map(rootText))}`, `gain ${figure(definition.gain)}`, ...timing(definition)]
    case 'measured':
      return [
        `measured as ${quantityNames[definition.mapping.quantity]}`,
        ...(definition.averages === undefined ? [] : [`${definition.averages} averages`]),
        definition.amplitude ? `amplitude ${definition.amplitude}` : 'amplitude not stated',
        definition.stayedStable === undefined ? 'closed-loop behaviour during the test not stated' : `the closed loop ${definition.stayedStable ? 'stayed stable' : 'did not stay stable'} during the test`,
        ...(definition.openLoopUnstablePoles === undefined ? [] : [`open-loop poles beyond the boundary: ${definition.openLoopUnstablePoles}`]),
      ]
  }
}

const quantityNames = {
  loopGain: 'loop gain L',
  returnDifference: 'return difference 1 + L',
  sensitivity: 'sensitivity 1/(1 + L)',
  complementarySensitivity: 'complementary sensitivity L/(1 + L)',
}

/** What a source says, as text: the expression, the coefficients, the roots, or how the response was measured. */
export function sourceWords(definition: SourceDefinition): string {
  const text = partsOf(definition).join('; ')
  return text.length <= printedLength ? text : `${text.slice(0, printedLength)} \u2026 (whole in snapshot.json of the package)`
}
