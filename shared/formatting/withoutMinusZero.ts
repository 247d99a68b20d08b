/** '0.0' for '-0.0': a number that rounds to zero is printed without a sign. */
export function withoutMinusZero(figure: string): string {
  return /^-[0.]*$/.test(figure) ? figure.slice(1) : figure
}
