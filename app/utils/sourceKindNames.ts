import type { SourceKind } from '#shared/types/source'

/** What each kind of source is called on screen. */
export const sourceKindNames: Record<SourceKind, string> = {
  expression: 'Expression',
  coefficients: 'Coefficients',
  zerosPoles: 'Zeros, poles, gain',
  measured: 'Measured response',
}
