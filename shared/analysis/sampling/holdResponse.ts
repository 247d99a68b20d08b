import type { HoldGain } from '../../types/block'

/**
 * The frequency response of a hold at w (rad/s, any sign), unit gain at w = 0, written as [re, im]: what one sample of the controller is to the plant on
 * average. zeroOrder: (1 - e^(-jwT))/(jwT); pwm, T the sample time, D the duty ratio: (e^(-jw(1-D)T/2) + e^(-jw(1+D)T/2))/2 of one update a period,
 * (e^(-jwDT) + e^(-jw(1-D)T))/2 of one an edge (D. M. Van de Sype et al., 'Small-signal Laplace-domain analysis of uniformly-sampled pulse-width modulators', 2004).
 */
export function holdResponse({ hold, sampleTime, duty = 0.5 }: HoldGain, w: number, out: Float64Array): void {
  const angle = w * sampleTime
  // All three are even about the middle of the sample: a real factor times half a sample of delay.
  const size = hold === 'zeroOrder'
    ? angle === 0 ? 1 : Math.sin(0.5 * angle) / (0.5 * angle)
    : Math.cos(hold === 'pwmSingleUpdate' ? 0.5 * duty * angle : (0.5 - duty) * angle)
  out[0] = size * Math.cos(0.5 * angle)
  out[1] = -size * Math.sin(0.5 * angle)
}
