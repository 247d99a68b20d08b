import { describe, expect, it } from 'vitest'
import { decodeText } from '#server/services/uploads/decodeText'

describe('the text of an uploaded file', () => {
  it.each([
    ['nothing', [], ''],
    ['UTF-8', [0xC3, 0xA4, 0x3B], 'ä;'],
    ['UTF-8 with its mark, which is dropped', [0xEF, 0xBB, 0xBF, 0x66], 'f'],
    ['UTF-16, low byte first', [0xFF, 0xFE, 0x66, 0x00, 0xE4, 0x00], 'fä'],
    ['UTF-16, high byte first', [0xFE, 0xFF, 0x00, 0x66, 0x00, 0xE4], 'fä'],
    ['the western code page of spreadsheets', [0x50, 0x72, 0xFC, 0x66, 0x20, 0xB0], 'Prüf °'],
  ])('is read from %s', (_, bytes, text) => {
    expect(decodeText(Uint8Array.from(bytes))).toBe(text)
  })
})
