import type { LoopGain } from '#shared/analysis/LoopGain'
import { buildLoopFigureData } from '#shared/plots/buildLoopFigureData'
import type { CrossingChartData, CrossingChartRow, LoopFigureData } from '#shared/plots/FigureData'
import type { LoopAnalysis } from '#shared/types/analysis'
import { analysisByScan } from './analysisByScan'
import { loopGainOfRoots, pair } from './loopGainOfRoots'

/** A position loop with a hydraulic resonance and a structural mode: meets gain and phase margin, not the vector margin. */
export const slewGain = loopGainOfRoots({
  gain: 17,
  zeros: [pair(62, 0.02), pair(279, 0.008)],
  poles: [[0, 0], pair(74, 0.016), pair(283, 0.004), [-160, 0]],
  deadTime: 0.0098,
})

/** The same loop with its gain times `factor` and everything `stretch` times as slow. */
function scaled(gain: LoopGain, factor: number, stretch: number): LoopGain {
  return {
    ...gain,
    features: gain.features.map(({ frequency, width }) => ({ frequency: frequency / stretch, width: width / stretch })),
    evaluate(w, out) {
      if (!gain.evaluate(w * stretch, out)) return false
      out[0]! *= factor
      out[1]! *= factor
      return true
    },
  }
}

/** A rate loop with many modes close to each other, so that marks and labels crowd. */
export const crowdedGain = loopGainOfRoots({
  gain: 30,
  zeros: [pair(40, 0.01), pair(60, 0.01), pair(66, 0.006), pair(72, 0.006), pair(95, 0.004)],
  poles: [[0, 0], pair(44, 0.008), pair(63, 0.006), pair(69, 0.004), pair(76, 0.004), pair(100, 0.003)],
  deadTime: 0.012,
})

/** Triple integrator with two leads: conditionally stable. */
export const conditionalGain = loopGainOfRoots({ gain: 6, zeros: [[-1.2, 0], [-1.5, 0]], poles: [[0, 0], [0, 0], [0, 0], [-90, 0], [-140, 0]] })

export const unstableGain = loopGainOfRoots({ gain: 60, poles: [[0, 0], pair(74, 0.02), [-30, 0]], deadTime: 0.004 })

/** Long dead time: the phase turns many times before the gain is small. */
export const delayedGain = loopGainOfRoots({ gain: 0.6, zeros: [[-2, 0]], poles: [[-0.4, 0], [-30, 0]], deadTime: 1.3 })

function figureData(title: string, gain: LoopGain, analysis: LoopAnalysis, required: number | null = 0.5): LoopFigureData {
  return buildLoopFigureData({ title, requiredVectorMargin: required, curves: [{ name: 'Extended, sea state 5', analysis, gain }] })
}

/** Made once: the scan is slow. Figures never change their data, which a test holds. */
function once<Value>(make: () => Value): () => Value {
  let made: Value | undefined
  return () => made ??= make()
}

export const slewPosition = once(() => figureData('SL-P Slew position', slewGain, analysisByScan(slewGain, 0.5, 3000)))
export const crowded = once(() => figureData('RO-R Roll rate', crowdedGain, analysisByScan(crowdedGain, 0.5, 1000)))
export const conditional = once(() => figureData('LU-P Luff position', conditionalGain, analysisByScan(conditionalGain, 0.05, 3000)))
export const unstable = once(() => figureData('TE-P Telescope position', unstableGain, analysisByScan(unstableGain, 0.5, 1000, 'unstable')))
export const delayed = once(() => figureData('TH-1 Thermal', delayedGain, analysisByScan(delayedGain, 0.05, 300), null))

/** The same loop in three conditions in one set of axes. */
export const overlaid = once((): LoopFigureData => {
  const names = ['Extended, sea state 5', 'Mid-stroke, calm', 'Payload 600 kg']
  const curves = [1, 0.7, 1.3].map((factor, i) => {
    const gain = scaled(slewGain, factor, 1 + 0.06 * i)
    return { name: names[i]!, gain, analysis: analysisByScan(gain, 0.5, 3000) }
  })
  return buildLoopFigureData({ title: 'SL-P Slew position', requiredVectorMargin: 0.5, curves: [curves[0]!, curves[1]!, curves[2]!] })
})

/** A measured response from 2 to 60 Hz with a gap that cannot be trusted, and confidence discs. */
export const measured = once((): LoopFigureData => {
  const from = 2 * 2 * Math.PI
  const to = 60 * 2 * Math.PI
  const gain: LoopGain = { ...slewGain, axisStart: from, axisEnd: to }
  const analysis = analysisByScan(gain, from, to, 'stable', 'Hz')
  const out = new Float64Array(2)
  const discs = Array.from({ length: 90 }, (_, i) => {
    const frequency = 2 * 30 ** (i / 89)
    slewGain.evaluate(frequency * 2 * Math.PI, out)
    // A made-up scatter without randomness, of the size of the disc.
    const radius = Math.hypot(out[0]!, out[1]!) * (0.03 + 0.05 * Math.abs(Math.sin(i)))
    return { frequency, re: out[0]! + radius * 0.6 * Math.sin(7 * i), im: out[1]! + radius * 0.6 * Math.cos(5 * i), radius }
  })
  analysis.samples = discs.length
  analysis.discs = discs
  analysis.coverage = {
    proven: false, from: 2, to: 60,
    exceptions: [{ from: 44, to: 46.4, reason: 'the phase may turn by more than half a turn between the samples' }],
  }
  return buildLoopFigureData({ title: 'SL-P Slew position', requiredVectorMargin: 0.5, curves: [{ name: 'sweep 2', analysis, gain, sampleFrequencies: discs.map(disc => disc.frequency) }] })
})

/** A model of record with its continuous approximation, a sweep that lies a little beside it, and a second sweep over part of the band. */
export const compared = once((): LoopFigureData => {
  const sweep = (name: string, factor: number, stretch: number, from: number, to: number) => {
    const gain: LoopGain = { ...scaled(slewGain, factor, stretch), axisStart: from, axisEnd: to }
    const analysis = analysisByScan(gain, from, to)
    const sampleFrequencies = Array.from({ length: 80 }, (_, i) => Math.min(to, from * (to / from) ** (i / 79)))
    analysis.samples = sampleFrequencies.length
    return { name, gain, analysis, sampleFrequencies }
  }
  const analysis = analysisByScan(slewGain, 0.5, 3000)
  return buildLoopFigureData({
    title: 'SL-P Slew position', requiredVectorMargin: 0.5,
    curves: [
      { name: 'design model', gain: slewGain, analysis },
      { name: 'continuous approximation', gain: scaled(slewGain, 1, 1.02), analysis, isApproximation: true },
      sweep('sweep 1', 1.1, 1.03, 2, 300),
      sweep('sweep 2', 0.92, 0.98, 30, 160),
    ],
  })
})

/** A dense sweep of record with the model it was compared with. */
export const measuredWithModel = once((): LoopFigureData => {
  const [main] = measured().curves
  const gain = scaled(slewGain, 1.15, 1.04)
  return buildLoopFigureData({
    title: 'SL-P Slew position', requiredVectorMargin: 0.5, range: measured().range,
    curves: [
      { name: 'sweep 2', analysis: main.analysis, gain: { ...slewGain, axisStart: 4 * Math.PI, axisEnd: 120 * Math.PI }, sampleFrequencies: main.samples!.map(({ frequency }) => frequency) },
      { name: 'design model', gain, analysis: analysisByScan(gain, 12, 380, 'stable', 'Hz') },
    ],
  })
})

export const crossingRows = once((): CrossingChartData => {
  const row = (code: string, name: string, gain: LoopGain | null, verdict: string, standing: CrossingChartRow['standing'], stability: 'stable' | 'unstable' = 'stable'): CrossingChartRow => ({
    key: code, code, name, verdict, standing, requiredVectorMargin: 0.5, gainAboveOne: false,
    analysis: gain && analysisByScan(gain, 0.5, 3000, stability),
  })
  const sweep = row('LU-R', 'Luff rate', scaled(slewGain, 1.2, 0.9), 'not shown', 'not shown')
  sweep.band = { from: 6, to: 400 }
  sweep.analysis!.coverage.exceptions.push({ from: 120, to: 150, reason: 'too wide a step of phase' })
  return {
    condition: 'Extended, sea state 5',
    frequencyUnit: 'rad/s',
    range: { from: 1, to: 1000 },
    rows: [
      row('SL-R', 'Slew rate', scaled(slewGain, 1.4, 1), 'stable, met', 'met'),
      row('SL-P', 'Slew position', slewGain, 'stable, not met', 'not met'),
      sweep,
      row('LU-P', 'Luff position', conditionalGain, 'stable, met', 'met'),
      row('TE-R', 'Telescope rate', scaled(slewGain, 0.8, 1.3), 'stable, not met, accepted', 'accepted'),
      row('TE-P', 'Telescope position', unstableGain, 'unstable', 'unstable', 'unstable'),
      row('RO-R', 'Roll rate', crowdedGain, 'stable, not met', 'not met'),
      row('RO-P', 'Roll position', null, 'no data', 'no data'),
    ],
  }
})
