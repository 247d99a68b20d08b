import type { LoopStructure } from '#shared/types/analysis'
import type { SourceDefinition, SourceKind } from '#shared/types/source'
import { describeBlockGain } from '#shared/formatting/describeBlockGain'
import { formatDelay } from '#shared/formatting/formatDelay'

export const kindNames: Record<SourceKind, string> = {
  coefficients: 'model, coefficients',
  zerosPoles: 'model, zeros, poles and gain',
  expression: 'model, expression',
  measured: 'measured response',
}

/** Characters of a definition that are printed; the package holds the whole. */
const printedLength = 700

function timing({ deadTime, sampleTime }: { deadTime?: number, sampleTime?: number }): string[] {
  return [
    ...(deadTime ? [`dead time ${formatDelay(deadTime)}`] : []),
    ...(sampleTime ? [`sampled every ${formatDelay(sampleTime)}`] : []),
  ]
}

function partsOf(definition: SourceDefinition, structure: LoopStructure | undefined): string[] {
  switch (definition.kind) {
    case 'expression':
      // Over blocks the variable is theirs.
      return [`${structure ? 'L' : definition.sampleTime ? 'L(z)' : 'L(s)'} = ${definition.expression}`, ...timing(definition)]
    case 'coefficients':
    case 'zerosPoles':
      return [describeBlockGain(definition)]
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
export function sourceWords(definition: SourceDefinition, structure?: LoopStructure): string {
  const text = partsOf(definition, structure).join('; ')
  return text.length <= printedLength ? text : `${text.slice(0, printedLength)} \u2026 (whole in snapshot.json of the package)`
}
