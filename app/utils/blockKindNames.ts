import type { BlockKind } from '#shared/types/block'

/** What each kind of a block's gain is called on screen, with one sentence of what it is. */
export const blockKindNames: Record<BlockKind, { name: string, about: string }> = {
  expression: { name: 'Expression', about: 'A formula in s, or in z, with parameters and other blocks.' },
  coefficients: { name: 'Coefficients', about: 'Numerator and denominator, as they stand in a data sheet or in code.' },
  zerosPoles: { name: 'Zeros, poles, gain', about: 'Where the roots lie, and the factor before their products.' },
  stateSpace: { name: 'State space', about: 'Matrices A, B, C, D from a file, with any number of inputs and outputs.' },
  sections: { name: 'Second-order sections', about: 'A digital filter exactly as it is coded, its coefficients kept as typed.' },
  modal: { name: 'Modal table', about: 'Flexible modes by frequency and damping, with what each input and output sees of them.' },
  measured: { name: 'Measured response', about: 'A sweep of this block alone, from a file.' },
  deadTime: { name: 'Dead time', about: 'The signal comes later, unchanged: exp(-s T).' },
  hold: { name: 'Hold', about: 'How the output of a sampled controller reaches the continuous plant.' },
}
