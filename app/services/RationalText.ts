/** What the fields of coefficients, or of zeros, poles and gain, hold as typed; sources and blocks have it among others. */
export interface RationalText {
  kind: string
  sampled: boolean
  numerator: string
  denominator: string
  zeros: string
  poles: string
  gain: string
}
