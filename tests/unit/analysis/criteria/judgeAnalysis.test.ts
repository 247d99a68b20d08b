import { describe, expect, it } from 'vitest'
import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import { hiddenMargin } from '#shared/analysis/criteria/hiddenMargin'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import { worstOf } from '#shared/analysis/criteria/worstOf'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { Criterion, CriterionQuantity, CriterionRow } from '#shared/types/criterion'

/** A stable, proven loop with rise 12 dB, fall 8 dB, lag 40 deg, lead 50 deg, vector margin 0.6, delay 0.1 s, unless changed. */
function analysisWith(change: Partial<LoopAnalysis> = {}): LoopAnalysis {
  return {
    frequencyUnit: 'rad/s',
    gainCrossovers: [
      { frequency: 3, phaseMargin: 40, delayMargin: 0.25, slope: 'falling' },
      { frequency: 20, phaseMargin: -50, delayMargin: 0.1, slope: 'rising' },
      { frequency: 30, phaseMargin: 80, delayMargin: 0.2, slope: 'falling' },
    ],
    phaseCrossovers: [
      { frequency: 1, gainMargin: -8, slope: 'falling' },
      { frequency: 10, gainMargin: 12, slope: 'falling' },
      { frequency: 40, gainMargin: 15, slope: 'rising' },
    ],
    closestApproaches: [{ frequency: 5, distance: 0.6, gainChange: 3, phaseChange: -10 }],
    vectorMargin: { distance: 0.6, frequency: 5 },
    summary: {
      gainIncrease: 12, gainDecrease: -8, phaseLag: 40, phaseLead: -50, delay: 0.1,
      impliedGainIncrease: 7.96, impliedGainDecrease: -4.08, impliedPhase: 34.9, sensitivityPeak: 1.667, complementarySensitivityPeak: 1.2,
    },
    stability: { verdict: 'stable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: 0, closedLoopUnstablePoles: 0 },
    coverage: { proven: true, from: 0, to: 'infinity', exceptions: [] },
    ...change,
  }
}

const limits = (change: Partial<Record<CriterionQuantity, number | null>> = {}): Criterion[] =>
  defaultCriteria.map(criterion => ({ ...criterion, ...(criterion.quantity in change && { limit: change[criterion.quantity] ?? null }) }))

function rowOf(rows: CriterionRow[], quantity: CriterionQuantity, direction: CriterionRow['direction'] = null): CriterionRow {
  const row = rows.find(row => row.quantity === quantity && row.direction === direction)
  if (row === undefined) throw new Error(`no row for ${quantity}`)
  return row
}

const stability = (verdict: LoopAnalysis['stability']['verdict'], reason?: string): Partial<LoopAnalysis> => ({
  summary: null,
  stability: { verdict, basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2, ...(reason !== undefined && { reason }) },
})

describe('judgeAnalysis, before any margin', () => {
  it('has no data where there is no analysis', () => {
    const judgement = judgeAnalysis(null, defaultCriteria)
    expect(judgement.verdict).toBe('no data')
    expect(judgement.rows).toHaveLength(6)
  })

  it('says unstable and gives no value when the closed loop is not stable, however wide its listed margins are', () => {
    const judgement = judgeAnalysis(analysisWith(stability('unstable')), defaultCriteria)
    expect(judgement.verdict).toBe('unstable')
    expect(judgement.rows.every(row => row.verdict === 'unstable' && row.value === null && row.driver === null)).toBe(true)
  })

  it('says unstable for a locus that meets -1, with the reason', () => {
    expect(judgeAnalysis(analysisWith(stability('marginal')), defaultCriteria)).toMatchObject({ verdict: 'unstable', reason: expect.stringContaining('meets -1') })
  })

  it('says not shown, with the engine\'s reason, when the verdict is open', () => {
    expect(judgeAnalysis(analysisWith(stability('undetermined', 'The count contradicts the test.')), defaultCriteria))
      .toMatchObject({ verdict: 'not shown', reason: 'The count contradicts the test.' })
  })
})

describe('judgeAnalysis, of a stable loop', () => {
  it('is met when every margin is at least its limit, a limit met exactly included', () => {
    const judgement = judgeAnalysis(analysisWith(), limits({ gainMargin: 8, phaseMargin: 40, vectorMargin: 0.6, delayMargin: 0.1 }))
    expect(judgement.verdict).toBe('met')
    expect(judgement.rows.map(row => row.verdict)).toEqual(['met', 'met', 'met', 'met', 'met', 'met'])
  })

  it('names for each smallest margin the crossing that sets it', () => {
    const { rows } = judgeAnalysis(analysisWith(), defaultCriteria)
    expect(rows.map(row => [row.direction, row.value, row.driver?.kind, row.driver?.index, row.driver?.frequency])).toEqual([
      ['rise', 12, 'phaseCrossover', 1, 10],
      ['fall', 8, 'phaseCrossover', 0, 1],
      ['lag', 40, 'gainCrossover', 0, 3],
      ['lead', 50, 'gainCrossover', 1, 20],
      [null, 0.6, 'closestApproach', 0, 5],
      [null, 0.1, 'gainCrossover', 1, 20],
    ])
  })

  it('counts the gain decrease of a conditionally stable loop', () => {
    const judgement = judgeAnalysis(analysisWith(), limits({ gainMargin: 9 }))
    expect(judgement.verdict).toBe('not met')
    expect([rowOf(judgement.rows, 'gainMargin', 'rise').verdict, rowOf(judgement.rows, 'gainMargin', 'fall').verdict]).toEqual(['met', 'not met'])
  })

  it('fails on the vector margin alone where gain and phase margins are met', () => {
    // 0.38 (s^2 + 0.1 s + 0.55) / (s (s + 1) (s^2 + 0.06 s + 0.5)): Astrom and Murray, Feedback Systems (2008), ch. 9: phase margin 70 deg, distance 0.27.
    const judgement = judgeAnalysis(analysisWith({
      gainCrossovers: [{ frequency: 0.4058, phaseMargin: 69.772, delayMargin: 3.001, slope: 'falling' }], phaseCrossovers: [],
      closestApproaches: [{ frequency: 0.7145, distance: 0.27093, gainChange: 2, phaseChange: -14 }], vectorMargin: { distance: 0.27093, frequency: 0.7145 },
    }), defaultCriteria)
    expect(judgement.rows.map(row => row.verdict)).toEqual(['met', 'met', 'met', 'met', 'not met', 'met, no limit'])
    expect(judgement.verdict).toBe('not met')
  })

  it('meets a limit in a direction in which nothing is crossed', () => {
    const { rows } = judgeAnalysis(analysisWith({ phaseCrossovers: [] }), defaultCriteria)
    expect(rowOf(rows, 'gainMargin', 'rise')).toMatchObject({ value: null, driver: null, verdict: 'met' })
  })

  it('says of a quantity without limit just that', () => {
    expect(judgeAnalysis(analysisWith(), limits({ gainMargin: null, phaseMargin: null, vectorMargin: null })).verdict).toBe('met, no limit')
    expect(judgeAnalysis(analysisWith(), []).verdict).toBe('met, no limit')
  })

  it('takes the end of the axis as driver where no approach sets the vector margin', () => {
    const { rows } = judgeAnalysis(analysisWith({ vectorMargin: { distance: 0.55, frequency: 'infinity' } }), defaultCriteria)
    expect(rowOf(rows, 'vectorMargin').driver).toEqual({ kind: 'end', index: null, frequency: 'infinity' })
  })

  it('knows that a biproper loop above one at infinity stands no delay', () => {
    const analysis = analysisWith()
    const { rows } = judgeAnalysis({ ...analysis, summary: { ...analysis.summary!, delay: 0 } }, limits({ delayMargin: 0.05 }))
    expect(rowOf(rows, 'delayMargin')).toMatchObject({ value: 0, verdict: 'not met', driver: { kind: 'end', frequency: 'infinity' } })
  })
})

describe('judgeAnalysis, where the data cannot tell', () => {
  const gap = (leastDistance?: number): Partial<LoopAnalysis> => ({
    coverage: { proven: false, from: 0, to: 'infinity', exceptions: [{ from: 4, to: 5, reason: 'Not searched.', ...(leastDistance !== undefined && { leastDistance }) }] },
  })

  it('does not call a margin met while a stretch of which nothing is known is open', () => {
    expect(judgeAnalysis(analysisWith(gap()), defaultCriteria)).toMatchObject({ verdict: 'not shown', reason: 'Not searched.' })
  })

  it('still calls a listed margin under its limit not met', () => {
    expect(judgeAnalysis(analysisWith(gap()), limits({ phaseMargin: 45 })).verdict).toBe('not met')
  })

  it('lets a stretch be that keeps far enough from -1 for each limit', () => {
    // At least 0.55 from -1: rise 6.94 dB, fall 3.81 dB, angle 31.9 deg (closed forms in hiddenMargin).
    const { rows } = judgeAnalysis(analysisWith(gap(0.55)), defaultCriteria)
    expect(rows.map(row => row.verdict)).toEqual(['met', 'not shown', 'met', 'met', 'met', 'met, no limit'])
  })

  it('does not trust lists that are not proven and say not why', () => {
    expect(judgeAnalysis(analysisWith({ coverage: { proven: false, from: 0, to: 'infinity', exceptions: [] } }), defaultCriteria).verdict).toBe('not shown')
  })

  it('trusts measured samples without untrusted gaps', () => {
    expect(judgeAnalysis(analysisWith({ coverage: { proven: false, from: 1, to: 50, exceptions: [] }, samples: 200 }), defaultCriteria).verdict).toBe('met')
  })

  const discs = (radius: number | null) => ({
    coverage: { proven: false, from: 1, to: 50, exceptions: [] }, samples: 3,
    discs: [1, 4.9, 5.1].map(frequency => ({ frequency, re: -0.4, im: 0, radius: frequency === 1 ? 0.001 : radius })),
  })

  it('does not call a distance met whose confidence circle reaches under the limit', () => {
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.11)), defaultCriteria).rows, 'vectorMargin').verdict).toBe('not shown')
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.09)), defaultCriteria).rows, 'vectorMargin').verdict).toBe('met')
    expect(rowOf(judgeAnalysis(analysisWith(discs(null)), defaultCriteria).rows, 'vectorMargin').verdict).toBe('not shown')
  })

  it('does not call a phase margin met whose confidence circle reaches under the limit', () => {
    // asin 0.2 = 11.54 deg, so 40 deg may be 28.46 deg; asin 0.15 = 8.63 deg.
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.2)), defaultCriteria).rows, 'phaseMargin', 'lag').verdict).toBe('not shown')
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.15)), defaultCriteria).rows, 'phaseMargin', 'lag').verdict).toBe('met')
  })

  it('does not call a gain margin met whose confidence circle reaches under the limit', () => {
    // 12 dB is |L| = 0.2512; with 0.26 more it is 0.5112, 5.83 dB; with 0.24 more 0.4912, 6.18 dB.
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.26)), defaultCriteria).rows, 'gainMargin', 'rise').verdict).toBe('not shown')
    expect(rowOf(judgeAnalysis(analysisWith(discs(0.24)), defaultCriteria).rows, 'gainMargin', 'rise').verdict).toBe('met')
  })
})

describe('hiddenMargin is what a least distance implies', () => {
  // Closed form, derived in the function; the guarantees of the vector margin (0.5 gives 2 and 28.955 deg: common practice, no source).
  it.each([[0.2, 1.25, 11.478340954533573], [0.5, 2, 28.95502437185985], [0.6, 2.5, 34.91520624744418]])(
    'distance %d: gain times %d, phase %d deg', (leastDistance, rise, phase) => {
      const stretch = { from: 1, to: 2, reason: '', leastDistance }
      expect(hiddenMargin({ quantity: 'gainMargin', direction: 'rise' }, stretch, 1)).toBeCloseTo(20 * Math.log10(rise), 10)
      expect(hiddenMargin({ quantity: 'phaseMargin', direction: 'lag' }, stretch, 1)).toBeCloseTo(phase, 10)
      expect(hiddenMargin({ quantity: 'delayMargin', direction: null }, stretch, 1)).toBeCloseTo(phase * Math.PI / 180 / 2, 10)
    })

  it('distance 1 hides no rise, distance 2 and more no phase margin, infinity every delay', () => {
    expect(hiddenMargin({ quantity: 'gainMargin', direction: 'rise' }, { from: 1, to: 2, reason: '', leastDistance: 1 }, 1)).toBe(Infinity)
    expect(hiddenMargin({ quantity: 'phaseMargin', direction: 'lag' }, { from: 1, to: 2, reason: '', leastDistance: 2 }, 1)).toBe(Infinity)
    expect(hiddenMargin({ quantity: 'delayMargin', direction: null }, { from: 1, to: 'infinity', reason: '', leastDistance: 1 }, 1)).toBe(0)
  })
})

describe('worstOf', () => {
  it('shows nothing of no verdicts', () => {
    expect(worstOf([])).toBe('no data')
  })

  it('follows the order unstable, not met, not shown, no data, accepted, met, no limit, not applicable', () => {
    verdictOrder.forEach((verdict, index) => expect(worstOf([...verdictOrder.slice(index)].reverse())).toBe(verdict))
    expect(verdictOrder).toEqual(['unstable', 'not met', 'not shown', 'no data', 'not met, accepted by deviation', 'met', 'met, no limit', 'not applicable'])
  })
})
