import { describe, expect, it } from 'vitest'
import { renderFigure } from '#server/adapters/svgdom/renderFigure'
import { buildBlockResponse } from '#shared/plots/buildBlockResponse'
import { figures } from '#shared/plots/figures'
import { responseWindow } from '#shared/plots/scales/responseWindow'
import { readoutOf } from '#shared/plots/text/readoutOf'
import { loopGainOfRoots, pair } from './loopGainOfRoots'

const lag = loopGainOfRoots({ gain: 1e-6, poles: [[-10, 0]] })

describe('the response of a block', () => {
  it('shows a gain far from 0 dB where it is, and no more than 120 dB of it', () => {
    expect(responseWindow([Number.NaN, Number.NEGATIVE_INFINITY])).toEqual({ from: -20, to: 20 })
    expect(responseWindow([-140, -152])).toEqual({ from: -160, to: -120 })
    expect(responseWindow([30, -300])).toEqual({ from: -80, to: 40 })
  })

  it('is sampled over a decade on either side of what it does', () => {
    const data = buildBlockResponse({ title: 'G', frequencyUnit: 'rad/s', gain: lag })
    expect(data.range).toEqual({ from: 1, to: 100 })
    // 1e-6 / (1 + j): 7.07e-7, which is -123.0 dB, at -45 deg, closed form; read between samples
    expect(readoutOf(data, 10)).toMatch(/^10\.00 rad\/s: gain 7\.0[5-9]e-7 \(−123\.0 dB\), phase −45\.0 deg$/)
  })

  it('ends at half the sample rate, which the caption tells', () => {
    const sampled = { ...lag, axisEnd: Math.PI / 0.1 }
    const data = buildBlockResponse({ title: 'C', frequencyUnit: 'Hz', gain: sampled, sampleTime: 0.1 })
    expect(data.range.to).toBeCloseTo(5, 12)
    expect(data.halfSampleRate).toBeCloseTo(5, 12)
    expect(figures.blockResponse.caption(data)).toContain('5')
  })

  it('is drawn the same each time, without a value that is no number', () => {
    const gain = loopGainOfRoots({ gain: 4, zeros: [pair(30, 0.01)], poles: [[0, 0], pair(44, 0.008)], deadTime: 0.02 })
    const data = buildBlockResponse({ title: 'G', frequencyUnit: 'rad/s', gain })
    const svg = renderFigure('blockResponse', data, { id: 'g', width: 420 })
    expect(renderFigure('blockResponse', data, { id: 'g', width: 420 })).toBe(svg)
    expect(svg).not.toMatch(/NaN|undefined|Infinity/)
    expect(svg).toContain('gain, dB')
  })
})
