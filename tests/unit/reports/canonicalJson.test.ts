import { describe, expect, it } from 'vitest'
import { canonicalJson } from '#server/reports/canonicalJson'

describe('canonical JSON', () => {
  it('refuses a number JSON cannot carry and names its place', () => {
    expect(() => canonicalJson({ cells: [{ distance: Number.NaN }] })).toThrow('cells[0].distance is NaN')
    expect(() => canonicalJson({ to: Infinity })).toThrow('to is Infinity')
  })

  it('refuses what is no data', () => {
    expect(() => canonicalJson({ when: () => 1 })).toThrow('when is a function')
  })

  it('leaves out fields that are undefined and writes no minus zero', () => {
    expect(canonicalJson({ b: undefined, a: -0 })).toBe('{"a":0}')
  })

  it('is the same whatever the order of the keys, at every depth', () => {
    expect(canonicalJson({ b: [{ y: 1, x: 2 }], a: null })).toBe(canonicalJson({ a: null, b: [{ x: 2, y: 1 }] }))
  })

  it('is read back as the same data', () => {
    const value = { text: 'quote " and \u2028', list: [1, 2.5e-300, 'x', true], empty: {} }
    expect(JSON.parse(canonicalJson(value))).toEqual(value)
  })
})
