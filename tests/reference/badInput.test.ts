import { describe, expect, it } from 'vitest'
import { analyseEntries } from '#shared/analysis/analyseEntries'

function failureOf(entry: unknown): { message: string, path: string } {
  const result = analyseEntries(entry, {
    onFault: (error) => {
      throw error
    },
  })
  if (Array.isArray(result) || !('error' in result)) throw new Error(`analysed: ${JSON.stringify(result).slice(0, 200)}`)
  return result.error
}

const points = (list: [number, number][]) => list.map(([frequency, re]) => ({ frequency, re, im: -0.1 }))
const measured = (list: unknown[], extra = {}) => ({ measured: { quantity: 'loopGain', points: list, ...extra } })

/** [what is wrong, the entry, the field that must be named] */
const REFUSED: [string, unknown, string | RegExp][] = [
  ['nothing', undefined, ''],
  ['a number', 7, ''],
  ['no source at all', {}, ''],
  ['two sources', { numerator: [1], denominator: [1, 1], expression: '1/s' }, /.*/],
  ['an empty denominator', { numerator: [1], denominator: [] }, 'denominator'],
  ['a zero denominator', { numerator: [1], denominator: [0, 0] }, 'denominator'],
  ['an empty numerator', { numerator: [], denominator: [1, 1] }, 'numerator'],
  ['a NaN coefficient', { numerator: [1], denominator: [1, Number.NaN] }, 'denominator[1]'],
  ['an infinite coefficient', { numerator: [Number.POSITIVE_INFINITY], denominator: [1, 1] }, 'numerator[0]'],
  ['a coefficient that is null, as JSON writes NaN', { numerator: [1], denominator: [1, null] }, 'denominator[1]'],
  ['an infinite gain', { zeros: [], poles: [[-1, 0]], gain: Number.POSITIVE_INFINITY }, 'gain'],
  ['a gain of zero', { zeros: [], poles: [[-1, 0]], gain: 0 }, 'gain'],
  ['an improper loop with dead time', { numerator: [1, 0, 0], denominator: [1, 1], deadTime: 1 }, /numerator|deadTime|^$/],
  ['an improper expression with dead time', { expression: 's^2/(s+1)*exp(-s)' }, 'expression'],
  ['complex poles that do not pair', { zeros: [], poles: [[-1, 2], [-1, -2.1]], gain: 1 }, /^poles/],
  ['a complex zero alone', { zeros: [[-1, 2]], poles: [[-1, 0], [-2, 0]], gain: 1 }, /^zeros/],
  ['a dead time below zero', { numerator: [1], denominator: [1, 1], deadTime: -1 }, 'deadTime'],
  ['a sample time of zero', { numerator: [1], denominator: [1, 0.5], sampleTime: 0 }, 'sampleTime'],
  ['a band that falls', { numerator: [1], denominator: [1, 1], band: [2, 1] }, /^band/],
  ['a negative frequency in the band', { numerator: [1], denominator: [1, 1], band: [-1, 1] }, /^band/],
  ['an unknown frequency unit', { numerator: [1], denominator: [1, 1], frequencyUnit: 'rpm' }, 'frequencyUnit'],
  ['a negative measured frequency', measured(points([[-1, 1], [2, 1]])), 'measured.points[0].frequency'],
  ['unsorted samples', measured(points([[1, 1], [3, 1], [2, 1]])), 'measured.points[2].frequency'],
  ['a repeated frequency', measured(points([[1, 1], [2, 1], [2, 1]])), 'measured.points[2].frequency'],
  ['a single sample', measured(points([[1, 1]])), 'measured.points'],
  ['no sample', measured([]), 'measured.points'],
  ['coherence above 1', measured([{ frequency: 1, re: 1, im: 0, coherence: 1.2 }, { frequency: 2, re: 1, im: 0, coherence: 0.5 }]), 'measured.points[0].coherence'],
  ['a sample that is not a number', measured([{ frequency: 1, re: Number.NaN, im: 0 }, { frequency: 2, re: 1, im: 0 }]), 'measured.points[0].re'],
  ['an expression of more than 10,000 characters', { expression: `1/(s+1${'+0*s'.repeat(2500)})` }, 'expression'],
  ['an expression that never ends', { expression: '('.repeat(9999) }, 'expression'],
  ['a tower of powers', { expression: '1/(s+1)^9^9^9^9' }, 'expression'],
  ['an enormous power', { expression: '1/(s+1)^99999999' }, 'expression'],
  ['an empty expression', { expression: '  ' }, 'expression'],
  ['an unknown name', { expression: '1/(s+wq)' }, 'expression'],
  ['a function that is no part of a loop', { expression: '1/sqrt(s+1)' }, 'expression'],
  ['an expression in the wrong variable', { expression: '1/(z-1)' }, 'expression'],
  ['code instead of an expression', { expression: 'f(x)=x; f(s)' }, 'expression'],
  ['a property instead of an expression', { expression: 's.constructor' }, 'expression'],
  ['a division by zero', { expression: '1/(s-s)' }, 'expression'],
  ['a parameter that is no number', { expression: 'k/s', parameters: { k: 'x' } }, /^parameters/],
]

describe('bad input gets a clear error that names its field', () => {
  for (const [what, entry, path] of REFUSED) {
    it(`refuses ${what}`, () => {
      const error = failureOf(entry)
      if (typeof path === 'string') expect(error.path).toBe(path)
      else expect(error.path).toMatch(path)
      expect(error.message.length).toBeGreaterThan(15)
      expect(error.message).not.toMatch(/undefined|\[object|NaN is not|Cannot read/)
    })
  }

  it('analyses the others of a list', () => {
    const results = analyseEntries([REFUSED[5]![1], { numerator: [3], denominator: [1, 3, 3, 1] }, REFUSED[7]![1]])
    expect(Array.isArray(results) && results.map(r => 'error' in r)).toEqual([true, false, true])
  })
})
