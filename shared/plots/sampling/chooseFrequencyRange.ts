import type { LoopGain } from '../../analysis/LoopGain'
import type { LoopAnalysis } from '../../types/analysis'

export interface FrequencyRange {
  from: number
  to: number
}

/** Most decades shown where nothing but features asks for them. */
const usualDecades = 4

/**
 * The range of frequency in which to draw a loop, in the unit of the analysis: every crossing and closest approach with a decade of context
 * on either side, within the axis of the loop gain (up to pi/T of a sampled loop). A measured loop is drawn over the band of its data.
 * Without any crossing the features of the loop gain are shown, and a loop without those from 0.1 to 10.
 */
export function chooseFrequencyRange(analysis: LoopAnalysis, gain: LoopGain): FrequencyRange {
  const unit = analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  if (gain.axisStart > 0 && Number.isFinite(gain.axisEnd)) return { from: gain.axisStart / unit, to: gain.axisEnd / unit }

  const frequencies: number[] = []
  for (const list of [analysis.gainCrossovers, analysis.phaseCrossovers, analysis.closestApproaches]) {
    for (const { frequency } of list) {
      if (typeof frequency === 'number' && frequency > 0) frequencies.push(frequency)
    }
  }
  const axisEnd = gain.axisEnd / unit
  let low: number
  let high: number
  if (frequencies.length > 0) {
    low = roundDown(Math.min(...frequencies) / 10)
    high = roundUp(Math.max(...frequencies) * 10)
  }
  else {
    const features = gain.features.map(feature => feature.frequency / unit).filter(frequency => frequency > 0 && frequency <= axisEnd)
    const middle = features.length > 0 ? features.reduce((sum, f) => sum + Math.log(f), 0) / features.length : Number.isFinite(axisEnd) ? Math.log(axisEnd / 30) : 0
    const reach = 10 ** (usualDecades / 2)
    const centre = Math.exp(middle)
    low = roundDown(Math.max(Math.min(...features, centre) / 10, centre / reach))
    high = roundUp(Math.min(Math.max(...features, centre) * 10, centre * reach))
  }
  return { from: Math.max(low, gain.axisStart / unit), to: Math.min(high, axisEnd) }
}

/** The next of 1, 2, 5 times a power of ten at or under the value. */
function roundDown(value: number): number {
  const exponent = Math.floor(Math.log10(value) + 1e-9)
  const digit = [5, 2, 1].find(candidate => Number(`${candidate}e${exponent}`) <= value * (1 + 1e-9)) ?? 1
  return Number(`${digit}e${exponent}`)
}

function roundUp(value: number): number {
  const exponent = Math.floor(Math.log10(value) + 1e-9)
  const digit = [1, 2, 5, 10].find(candidate => Number(`${candidate}e${exponent}`) >= value * (1 - 1e-9)) ?? 10
  return Number(`${digit}e${exponent}`)
}
