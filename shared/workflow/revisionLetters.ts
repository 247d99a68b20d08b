/** The letters a revision may carry: ASME Y14.35 leaves out I, O, Q, S, X and Z. */
const letters = 'ABCDEFGHJKLMNPRTUVWY'

/**
 * The revision letter after `letter` in the order of ASME Y14.35: A ... Y, then AA, AB ... AY, BA ...;
 * 'A' after none. Throws a RangeError for a text that is no such letter.
 */
export function nextRevisionLetter(letter: string | null): string {
  if (letter === null) return 'A'
  const digits = [...letter].map(character => letters.indexOf(character))
  if (digits.length === 0 || digits.includes(-1)) throw new RangeError(`'${letter}' is no revision letter of ASME Y14.35`)
  for (let place = digits.length - 1; place >= 0; place--) {
    const digit = digits[place] ?? 0
    if (digit + 1 < letters.length) {
      digits[place] = digit + 1
      return digits.map(value => letters[value]).join('')
    }
    digits[place] = 0
  }
  return 'A' + digits.map(value => letters[value]).join('')
}
