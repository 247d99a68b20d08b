import type { MeasuredInput, Stability } from '../../types/analysis'
import { countEncirclements } from './countEncirclements'
import type { MeasuredCurve } from './MeasuredCurve'

/** |1 + L| at a sample up to which the locus meets -1 to within rounding. */
const meetsCriticalPoint = 1e-14

/**
 * The closed-loop verdict of a measured response: what the loop did in the test, checked by the count of encirclements where the
 * data allow one, or the count alone where the test tells nothing.
 *
 * @param openGap a gap in which the locus may pass -1 on either side, null where there is none
 */
export function measuredStability(input: MeasuredInput, curve: MeasuredCurve, openGap: { from: number, to: number } | null): Stability {
  const { stayedStable } = input.measured
  const unit = input.frequencyUnit ?? 'rad/s'
  const poles = input.openLoopUnstablePoles ?? null
  const meeting = curve.re.findIndex((re, i) => Math.hypot(1 + re, curve.im[i]!) <= meetsCriticalPoint)
  if (meeting >= 0) {
    return { verdict: 'marginal', basis: 'counted', openLoopUnstablePoles: poles, encirclements: null, closedLoopUnstablePoles: null,
      reason: `The sample at ${figure(curve.frequency[meeting]!)} ${unit} lies on -1.` }
  }
  const count = openGap === null
    ? countEncirclements(curve, input.openLoopOriginPoles)
    : { reason: `between the samples at ${figure(openGap.from)} and ${figure(openGap.to)} ${unit} the locus may pass -1 on either side` }
  const encirclements = 'encirclements' in count ? count.encirclements : null
  const closed = encirclements === null || poles === null ? null : poles - encirclements
  const numbers = { openLoopUnstablePoles: poles, encirclements, closedLoopUnstablePoles: closed }
  const open = 'reason' in count ? `Not counted: ${count.reason}.` : undefined
  if (stayedStable === undefined) return { ...numbers, basis: 'counted', ...verdictByCount(numbers, open) }
  // Clockwise encirclements mean an unstable closed loop whatever the number of open-loop unstable poles.
  const unstableByCount = (closed ?? -(encirclements ?? 0)) > 0
  const decided = closed !== null || unstableByCount
  const basis = decided ? 'observed and counted' : 'observed'
  const contradicted = stayedStable ? decided && closed !== 0 : closed !== null && closed <= 0
  if (contradicted) return { ...numbers, basis, verdict: 'undetermined', reason: contradictionOf(input, curve, numbers) }
  const uncounted = open ?? (decided ? undefined : `Not counted: the number of open-loop unstable poles is not given (${describeCount(encirclements!)}).`)
  return { ...numbers, basis, verdict: stayedStable ? 'stable' : 'unstable', ...(uncounted !== undefined && { reason: uncounted }) }
}

/** A frequency in a sentence. */
const figure = (value: number) => String(Number(value.toPrecision(5)))

type Numbers = Pick<Stability, 'openLoopUnstablePoles' | 'encirclements' | 'closedLoopUnstablePoles'>

function describeCount(encirclements: number): string {
  if (encirclements === 0) return 'no encirclement of -1'
  const turn = encirclements > 0 ? 'counter-clockwise' : 'clockwise'
  return `${Math.abs(encirclements)} ${turn} encirclement${Math.abs(encirclements) === 1 ? '' : 's'} of -1`
}

function verdictByCount({ encirclements, closedLoopUnstablePoles: closed }: Numbers, open: string | undefined): Pick<Stability, 'verdict' | 'reason'> {
  if (open !== undefined || encirclements === null) return { verdict: 'undetermined', reason: `${open} What the loop did during the test is not stated either.` }
  if (closed === 0) return { verdict: 'stable', reason: 'Counted over the samples, the loop gain taken to stay under 1 above them.' }
  if (closed === null) {
    return encirclements < 0
      ? { verdict: 'unstable', reason: `The samples give ${describeCount(encirclements)}: unstable whatever the number of open-loop unstable poles.` }
      : { verdict: 'undetermined', reason: `The samples give ${describeCount(encirclements)}; state the number of open-loop unstable poles, or what the loop did during the test.` }
  }
  if (closed > 0) return { verdict: 'unstable', reason: `The samples give ${describeCount(encirclements)}: ${closed} closed-loop unstable pole${closed === 1 ? '' : 's'}.` }
  return { verdict: 'undetermined', reason: `The samples give ${describeCount(encirclements)}, more than there are open-loop unstable poles: suspect the number of open-loop unstable poles, then the sign.` }
}

/** What to suspect when the test and the count disagree: the sign first where the opposite sign would agree. */
function contradictionOf(input: MeasuredInput, curve: MeasuredCurve, { encirclements, openLoopUnstablePoles: poles }: Numbers): string {
  const observed = input.measured.stayedStable ? 'stayed stable' : 'did not stay stable'
  const told = `The loop ${observed} in the test, but the samples give ${describeCount(encirclements!)} with ${poles === null ? 'an unstated number of' : poles} open-loop unstable pole${poles === 1 ? '' : 's'}.`
  const turned = countEncirclements(curve, input.openLoopOriginPoles, -1)
  const signExplains = 'encirclements' in turned && (poles === null ? turned.encirclements >= 0 : (poles - turned.encirclements === 0) === input.measured.stayedStable)
  const suspects = 'the break point (is another loop open or closed that should not be?), the number of open-loop unstable poles and of poles at the origin'
  return signExplains
    ? `${told} With the opposite sign both agree: suspect the sign of the response first, then ${suspects}.`
    : `${told} Suspect ${suspects}, then the sign of the response.`
}
