import { deflateSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { makeMarkSafe } from '#server/services/brand/makeMarkSafe'
import { sizeOfJpeg } from '#server/services/brand/readImageSize'

function chunk(type: string, data: Buffer): Buffer {
  const length = Buffer.alloc(4)
  length.writeUInt32BE(data.length)
  return Buffer.concat([length, Buffer.from(type, 'latin1'), data, Buffer.alloc(4)])
}
/** A PNG of one colour, its sums left at zero: readers of the header do not look at them. */
function png(width: number, height: number): Buffer {
  const header = Buffer.alloc(13)
  header.writeUInt32BE(width, 0)
  header.writeUInt32BE(height, 4)
  header.set([8, 0, 0, 0, 0], 8)
  return Buffer.concat([Buffer.from([0x89, 0x50, 0x4E, 0x47, 0x0D, 0x0A, 0x1A, 0x0A]), chunk('IHDR', header), chunk('IDAT', deflateSync(Buffer.alloc(8))), chunk('IEND', Buffer.alloc(0))])
}
const svgOf = async (text: string) => (await makeMarkSafe(Buffer.from(text))).bytes.toString('utf8')

describe('a team\u2019s mark', () => {
  it.each([
    ['nothing', Buffer.alloc(0), 'empty'],
    ['text', Buffer.from('hello'), 'must be a PNG, JPEG or SVG'],
    ['a page', Buffer.from('<!DOCTYPE html><p>hello</p>'), 'must be a PNG, JPEG or SVG'],
    ['a PDF', Buffer.from('%PDF-1.4\n%\u00e2\u00e3'), 'this is application/pdf'],
    ['a GIF', Buffer.from('GIF89a\u0001\u0000\u0001\u0000', 'latin1'), 'this is image/gif'],
    ['a PNG cut short', png(10, 10).subarray(0, 20), 'damaged'],
    ['a PNG of 5000 pixels', png(5000, 10), '5000 x 10 pixels'],
    ['an empty drawing', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"></svg>'), 'no drawing'],
    ['a drawing of no size', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><rect width="1" height="1"/></svg>'), 'does not say how large'],
  ])('is refused when it is %s', async (_, bytes, words) => {
    await expect(makeMarkSafe(bytes)).rejects.toThrow(words)
  })

  it('is refused over 1 MB', async () => {
    await expect(makeMarkSafe(Buffer.concat([png(10, 10), Buffer.alloc(1_000_001)]))).rejects.toMatchObject({ code: 'tooLarge' })
  })

  it('is told by its content, not by a name, and kept byte for byte as PNG', async () => {
    expect(await makeMarkSafe(png(40, 20))).toEqual({ mediaType: 'image/png', bytes: png(40, 20) })
  })

  it('has the size of the first frame of a JPEG, whatever comes before it', () => {
    // SOI, APP0 of 16 bytes, SOF2 (progressive) 300 high and 400 wide: laid out by ITU-T T.81, annex B
    const bytes = Buffer.from([0xFF, 0xD8, 0xFF, 0xE0, 0, 16, ...Array<number>(14).fill(0), 0xFF, 0xC2, 0, 17, 8, 1, 44, 1, 144, 3, 0, 0, 0])
    expect(sizeOfJpeg(bytes)).toEqual({ width: 400, height: 300 })
    expect(sizeOfJpeg(bytes.subarray(0, 22))).toBeNull()
  })

  it('keeps the shapes of an SVG and loses all that could run, load or point outside it', async () => {
    const svg = await svgOf(`<?xml version="1.0"?><svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink" viewBox="0 0 10 10" onload="alert(1)">
      <style>@import "http://example.org/a.css"; rect { fill: url(http://example.org/b) }</style><script>alert(1)</script>
      <defs><linearGradient id="g"><stop offset="0"/></linearGradient></defs>
      <a href="http://example.org"><rect width="1" height="1"/></a><image href="http://example.org/c.png"/><use xlink:href="http://example.org/d.svg#x"/>
      <foreignObject><iframe src="http://example.org/e"/></foreignObject><animate attributeName="href" to="javascript:alert(1)"/>
      <circle r="3" fill="url(http://example.org/f)" style="fill:url('http://example.org/g')" onclick="alert(1)"/><path d="M0 0h4" fill="url(#g)"/></svg>`)
    expect(svg).not.toMatch(/example\.org|script|onload|onclick|@import|<style|<a[ >]|<image|foreignObject|iframe|animate/)
    expect(svg).toContain('<circle r="3"')
    expect(svg).toContain('fill="url(#g)"')
    expect(svg).toContain('viewBox="0 0 10 10"')
  })
})
