import type { ReportSnapshot } from '#shared/types/snapshot'
import type { SectionView } from './ReportView'

const signs = [
  { term: 'Loop gain L', words: 'the gain once around the loop opened at its break point, for negative feedback: the critical point is \u22121 and the return difference is 1 + L.' },
  { term: 'Gain crossover', words: 'a frequency at which |L| = 1. Its phase margin is told in words: \u2018lag 32.3 deg\u2019 means that this much more lag reaches \u22121, \u2018lead 20 deg\u2019 that this much lead does.' },
  { term: 'Phase crossover', words: 'a frequency at which L is real and negative, zero frequency and the end of the axis included. \u2018Gain may rise 12.4 dB\u2019 and \u2018gain may fall 6.1 dB\u2019 say how far the gain may change before L is \u22121 there.' },
  { term: 'Delay margin', words: 'the least added delay that takes a gain crossover to \u22121: its phase margin, taken between 0 and 360 deg, over its frequency.' },
  { term: 'Closest approach', words: 'a local minimum of |1 + L|, the distance of L to \u22121. Beside it stands one change of gain and phase together that takes this very point to \u22121. It is one such change, not the smallest combination.' },
  { term: 'Vector margin', words: 'the least |1 + L| over all frequencies, a ratio. A vector margin d lets the gain rise by 1/(1 \u2212 d), fall by 1/(1 + d), and the phase move by 2 asin(d/2) either way, each alone. Gain and phase margin together do not imply a vector margin.' },
  { term: 'Closed loop', words: 'judged by counting encirclements of \u22121 (Nyquist, Regeneration Theory, 1932), or observed during the test where L was measured; the basis is printed with each verdict. A closed loop that is not shown to be stable has no margins: only distances to \u22121 are printed.' },
  { term: 'Frequencies', words: 'stand in the unit given in each head; s, zeros and poles are in rad/s. Crossings whose |L| lies below the gain floor of the analysis are left out.' },
]

const method = [
  { term: 'Models', words: 'Crossings and closest approaches are searched on the factors of L with Taylor series of log L whose remainder is bounded. Every stretch of the frequency axis is either shown to hold none or lies in a bracket shown to hold exactly one; what cannot be shown is listed as \u2018not proven\u2019 with its place and reason. A report with a model loop that is not proven is not issued.' },
  { term: 'Measured responses', words: 'Log magnitude and unwrapped phase are interpolated between samples. Gaps too wide to trust are listed with the reason, among them those where a local rational interpolant disagrees (Nakatsukasa, S\u00e8te and Trefethen, The AAA Algorithm for Rational Approximation, 2018). Measured data prove nothing between their samples.' },
  { term: 'Verdicts', words: 'worst first: unstable; not met; not shown (the data cannot tell); no data; not met, accepted by deviation; met; met, no limit; not applicable.' },
  { term: 'Further reading', words: 'Bode, Network Analysis and Feedback Amplifier Design, 1945 (return difference, gain and phase margin); \u00c5str\u00f6m and Murray, Feedback Systems, 2008 (the least distance to the critical point as a margin).' },
]

/** What is said beside it where loop gains are built from blocks. */
const methodOfBlocks = [
  { term: 'Blocks', words: 'A loop gain is an expression over blocks. Rational parts and dead times are combined in exact arithmetic on the numbers given; a pole that another block\u2019s zero cancels stays a mode of the loop and is named where it is not stable. One with a measured block is taken at the points measured.' },
  { term: 'Sampled controllers', words: 'Continuous blocks behind a hold are replaced, with all dead time among them, by their exact discrete equivalent at the sampling instants (\u00c5str\u00f6m and Wittenmark, Computer-Controlled Systems, 1997; Jury, Theory and Application of the z-Transform Method, 1964). Verdicts and margins are those of that loop gain. The continuous approximation, controller times hold, delay and plant, is printed beside it and judges nothing.' },
  { term: 'State space', words: 'Matrices are balanced and reduced to Hessenberg form in double-double arithmetic, where poles and zeros are refined to more digits than the numbers given have (Golub and Van Loan, Matrix Computations, 2013; Hyman\u2019s method: Wilkinson, The Algebraic Eigenvalue Problem, 1965). How far what was analysed lies from the matrices given is printed with each loop, as are states that cannot be reached or seen.' },
]

/** How to read the numbers, and how they were found. */
export function conventionsSection(snapshot: ReportSnapshot, number: string): SectionView {
  return {
    number,
    anchor: 'conventions',
    title: 'Conventions and method',
    introduction: [],
    blocks: [
      { title: 'Words and signs', paragraphs: [], items: signs, table: null },
      { title: 'How the crossings are found', paragraphs: [`Engine ${snapshot.engineVersion}.`], items: snapshot.blocks?.length ? [method[0]!, ...methodOfBlocks, ...method.slice(1)] : method, table: null },
    ],
  }
}
