import type { DrawFigure } from '../Figure'
import type { BlockResponseData } from '../FigureData'
import { clipPolyline } from '../curves/clipPolyline'
import { curveViews } from '../curves/curveViews'
import { pathData } from '../curves/pathData'
import { pointsInside } from '../curves/pointsInside'
import { shownPhase, type PhaseWindow } from '../curves/phaseWindow'
import { valueOfView } from '../curves/valueOfView'
import { wrapPhase } from '../curves/wrapPhase'
import { drawFrequencyGrid, drawFrequencyNumbers, frequencyAxisHeight, numberOverhang } from '../marks/drawFrequencyAxis'
import { drawLevels } from '../marks/drawLevels'
import { drawSamples } from '../marks/drawSamples'
import { linearScale } from '../scales/linearScale'
import { linearTicks } from '../scales/linearTicks'
import { logScale } from '../scales/logScale'
import { responseWindow } from '../scales/responseWindow'

/** deg; a phase that turns further is wrapped. */
const longestUnwrapped = 900

/** Gain and phase of one block over frequency, one over the other on one frequency axis. */
export const drawBlockResponse: DrawFigure<BlockResponseData> = (pen, data, options) => {
  const { theme, width } = options
  const height = options.height ?? Math.round(Math.min(width * 0.78, 420))
  const views = curveViews(data.response)
  const window = windowOf(views.phase)
  const size = theme.size.tick
  const between = size + 18
  const room = height - size - 10 - between - frequencyAxisHeight(theme)
  const upper = { x: size * 4, y: size + 10, width: width - size * 4 - numberOverhang(theme), height: Math.round(room * 0.56) }
  const lower = { ...upper, y: upper.y + upper.height + between, height: room - upper.height }
  const decibels = responseWindow(views.gain)
  const x = logScale(data.range.from, data.range.to, upper.x, upper.x + upper.width)
  const gain = linearScale(decibels.from, decibels.to, upper.y + upper.height, upper.y)
  const phase = linearScale(window.from, window.to, lower.y + lower.height, lower.y)

  for (const panel of [upper, lower]) drawFrequencyGrid(pen, x, panel, theme)
  drawLevels(pen, gain, linearTicks(gain.from, gain.to, upper.height / 24, [5, 10, 20, 40]), upper, 'gain, dB', theme)
  drawLevels(pen, phase, linearTicks(phase.from, phase.to, lower.height / 20, [30, 45, 90, 180, 360]), lower, 'phase, deg', theme)
  drawFrequencyNumbers(pen, x, lower, data.frequencyUnit, theme, 'below')
  if (data.halfSampleRate !== undefined && data.halfSampleRate <= data.range.to * (1 + 1e-9)) {
    const end = Math.round(x.toPixel(data.halfSampleRate) * 10) / 10
    for (const panel of [upper, lower]) pen.stroke(`M${end} ${panel.y}v${panel.height}`, theme.slate, theme.stroke.axis, { 'stroke-dasharray': '8 2 2 2' })
  }
  const xs = data.response.frequency.map(x.toPixel)
  const attributes = { 'stroke-linejoin': 'round' }
  pen.stroke(pathData(clipPolyline(xs, views.gain.map(gain.toPixel), upper)), theme.ink, theme.stroke.curve, attributes)
  const wrapped = wrapPhase(data.response.frequency, views, window)
  pen.stroke(pathData(clipPolyline(wrapped.frequency.map(x.toPixel), wrapped.phase.map(phase.toPixel), lower)), theme.ink, theme.stroke.curve, attributes)
  drawSamples(pen, data.samples, ({ frequency, re, im }) => [x.toPixel(frequency), gain.toPixel(20 * Math.log10(Math.hypot(re, im)))], upper, theme)

  return {
    width,
    height,
    panels: [{ ...upper, xScale: x, yScale: gain }, { ...lower, xScale: x, yScale: phase }],
    marks: [],
    locate: (px, py) => {
      const inside = [upper, lower].some(panel => px >= panel.x && px <= panel.x + panel.width && py >= panel.y && py <= panel.y + panel.height)
      return inside ? { frequency: x.toValue(px) } : null
    },
    pointsAt: (frequency) => {
      const high = valueOfView(data.response, views.gain, frequency)
      const turn = valueOfView(data.response, views.phase, frequency)
      return high === null || turn === null ? [] : pointsInside([[x.toPixel(frequency), gain.toPixel(high), upper], [x.toPixel(frequency), phase.toPixel(shownPhase(turn, window)), lower]])
    },
  }
}

function windowOf(phase: Float64Array): PhaseWindow {
  let [low, high] = [Infinity, -Infinity]
  for (const value of phase) {
    if (value < low) low = value
    if (value > high) high = value
  }
  if (low > high) return { from: -180, to: 0, wrapped: false }
  if (high - low > longestUnwrapped) return { from: -360, to: 0, wrapped: true }
  const from = 90 * Math.floor((low - 5) / 90)
  return { from, to: Math.max(90 * Math.ceil((high + 5) / 90), from + 180), wrapped: false }
}
