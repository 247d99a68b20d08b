/** (re + j im) * 2^exponent; the mantissas are as long as the arithmetic that made them keeps, shorter where the value is exact. */
export interface ComplexFloat {
  re: bigint
  im: bigint
  exponent: number
}
