/** The fields of each source form; a loop is given in exactly one form, its `key` fields all present. */
export const sourceForms = [
  { name: 'coefficients', key: ['numerator', 'denominator'], other: ['deadTime', 'sampleTime'] },
  { name: 'zeros, poles and gain', key: ['zeros', 'poles', 'gain'], other: ['deadTime', 'sampleTime'] },
  { name: 'an expression', key: ['expression'], other: ['parameters', 'sampleTime', 'blocks'] },
  { name: 'a measured response', key: ['measured'], other: ['openLoopUnstablePoles', 'openLoopOriginPoles'] },
] as const

export type SourceForm = (typeof sourceForms)[number]

export const commonFields = ['name', 'frequencyUnit', 'gainFloor', 'band'] as const

/** Every field that the contract of an analysis knows at its top level. */
export const contractFields: readonly string[] = [
  ...commonFields, ...new Set(sourceForms.flatMap((form): string[] => [...form.key, ...form.other])),
]
