interface ApproximatePole { re: number, im: number, multiplicity: number }

const GRID = 10
const MOST_MODES = 8
/** Lowest frequency looked at, of half the sampling frequency. */
const LOWEST = 1e-6

/** Frequencies (rad/s) where an equivalent is compared with what it came from: a grid up to half the sampling frequency, and beside the lightest modes, in place of which aliases show. */
export function checkFrequencies(poles: readonly ApproximatePole[], sampleTime: number): number[] {
  const end = Math.PI / sampleTime
  const sizes = poles.map(({ re, im }) => Math.hypot(re, im)).filter(size => size > 0)
  const start = Math.min(0.3 * end, Math.max(LOWEST * end, 0.3 * Math.min(end, ...sizes)))
  const grid = Array.from({ length: GRID }, (_, k) => start * (end / start) ** (k / (GRID - 1)) * (1 - 2 ** -12))
  const modes = poles.filter(({ im }) => im > 0)
    .sort((a, b) => Math.abs(a.re / a.im) - Math.abs(b.re / b.im))
    .slice(0, MOST_MODES)
    // beside an undamped mode, not on it
    .map(({ im }) => im * (1 + 2 ** -10))
  return [...grid, ...modes]
}

/** Bits so that the fixed-point sum of the modes has `target` bits left where the denominator is smallest on the unit circle: an estimate, checked afterwards. */
export function lowestBits(poles: readonly ApproximatePole[], frequencies: number[], sampleTime: number, target: number): number {
  let most = 0
  for (const w of frequencies) {
    let lost = 0
    for (const { re, im, multiplicity } of poles) {
      for (const part of im > 0 ? [im, -im] : [0]) {
        // |e^(jwT) - e^(pT)|
        const size = Math.exp(Math.min(re * sampleTime, 600))
        const angle = (w - part) * sampleTime
        const distance = Math.hypot(1 - size, 2 * Math.sqrt(size) * Math.sin(0.5 * angle))
        lost += multiplicity * Math.max(0, Math.log2((1 + size) / distance))
      }
    }
    most = Math.max(most, lost)
  }
  return 64 * Math.ceil((target + 64 + most) / 64)
}
