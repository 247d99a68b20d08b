import { describe, expect, it } from 'vitest'
import { channelNames } from '~/utils/channelNames'
import { parseTimeText } from '~/utils/parseTimeText'
import { pastedCells } from '~/utils/pastedCells'

describe('cells that are pasted', () => {
  it('are left to the field where there is only one', () => {
    expect(pastedCells('12.5')).toBeNull()
    expect(pastedCells('first bending mode')).toBeNull()
    expect(pastedCells('12.5\n', { numbers: true })).toBeNull()
  })

  it('come from a spreadsheet by tabs, an empty cell too', () => {
    expect(pastedCells('bending\t12.5\t\r\ntorsion\t30\t0.01\r\n')).toEqual([['bending', '12.5', ''], ['torsion', '30', '0.01']])
  })

  it('come with a decimal comma from spreadsheets that write one', () => {
    expect(pastedCells('0,5\t-1,25e-3\t2', { numbers: true })).toEqual([['0.5', '-1.25e-3', '2']])
  })

  it('come from code, with brackets and the letter of its kind of number', () => {
    expect(pastedCells('{ 16384/32768, -0.5f, 1.0f },\n{ 1, 0, 0 },\n', { numbers: true })).toEqual([['16384/32768', '-0.5', '1.0'], ['1', '0', '0']])
    expect(pastedCells('0.5 0.25 1', { numbers: true })).toEqual([['0.5', '0.25', '1']])
  })
})

describe('a typed time', () => {
  it('is the double nearest to the decimal, in whatever unit', () => {
    expect(parseTimeText('20us')).toBe(0.00002)
    expect(parseTimeText('1.25 ms')).toBe(0.00125)
    expect(parseTimeText('3e1 µs')).toBe(0.00003)
    expect(parseTimeText('0.02')).toBe(0.02)
  })

  it('is none where there is only a unit, or a unit that no time has', () => {
    expect(parseTimeText('  ')).toBeNull()
    expect(parseTimeText('ms')).toBeNaN()
    expect(parseTimeText('20 kHz')).toBeNaN()
  })
})

describe('channels as typed', () => {
  it('are only counted where they are numbers from 1 on', () => {
    expect(channelNames('')).toEqual({ names: [], count: 1 })
    expect(channelNames('1, 2')).toEqual({ names: [], count: 2 })
  })

  it('are refused where a name could not stand in an expression', () => {
    expect(() => channelNames('rate, 2')).toThrow('\'2\' cannot be the name of a channel')
    expect(() => channelNames('a, a')).toThrow('stands twice')
  })
})
