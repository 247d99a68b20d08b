import { describe, expect, it } from 'vitest'
import { namesUsed } from '~/utils/namesUsed'
import { parseNumberList } from '~/utils/parseNumberList'
import { parseNumberText } from '~/utils/parseNumberText'
import { parseRoots } from '~/utils/parseRoots'
import { rootsAsText } from '~/utils/rootsAsText'

describe('a typed number', () => {
  it.each(['1,5', '0x10', 'Infinity', '1e999', '--1', '1 2', 'abc', '.', 'e5'])('%s is none', (text) => {
    expect(parseNumberText(text)).toBeNaN()
  })

  it('is nothing where nothing is typed', () => {
    expect(parseNumberText('  ')).toBeNull()
  })

  it.each([['−3', -3], ['+.5', 0.5], ['1e-3', 0.001], ['2.', 2]])('%s is %d', (text, value) => {
    expect(parseNumberText(text)).toBe(value)
  })
})

describe('typed coefficients', () => {
  it('name the entry that is no number, and its place', () => {
    expect(() => parseNumberList('25 5O')).toThrow(`'5O', entry 2`)
  })

  it.each(['[25, 50]', '25 50', '25;50', '25\n50\n', '25\t50'])('%j are 25 and 50', (text) => {
    expect(parseNumberList(text)).toEqual([25, 50])
  })
})

describe('typed roots', () => {
  it.each(['1 2 3', 'a', '-1 ± ', '1 +'])('%s is none, and its line is named', (text) => {
    expect(() => parseRoots(`-2\n${text}`)).toThrow('Line 2')
  })

  it.each([
    ['-1 ± 3', [[-1, 3], [-1, -3]]],
    ['-1 +- 3j', [[-1, 3], [-1, -3]]],
    ['-1 +/- j3', [[-1, 3], [-1, -3]]],
    ['-1 - 3j', [[-1, -3]]],
    ['-1 + 3i', [[-1, 3]]],
    ['-1 -3', [[-1, -3]]],
    ['−2.5', [[-2.5, 0]]],
    ['', []],
  ])('%j', (text, roots) => {
    expect(parseRoots(text)).toEqual(roots)
  })

  it('come back as they went', () => {
    const roots: [number, number][] = [[0, 0], [-1, 3], [-0.5, 80], [-1, -3], [-0.5, -80], [-7, 2]]
    expect(rootsAsText(roots)).toBe('0\n-1 ± 3\n-0.5 ± 80\n-7 2')
    expect(parseRoots(rootsAsText(roots)).sort()).toEqual([...roots].sort())
  })
})

describe('the names an expression uses', () => {
  it('leave out s, z, pi, functions and the e of 1e-3', () => {
    expect(namesUsed('k*(s+wz)/(s*(s+2*pi))*exp(-s*1e-3) + k*sqrt(s) + z_2')).toEqual(['k', 'wz', 'z_2'])
  })
})
