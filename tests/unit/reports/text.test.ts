import { describe, expect, it } from 'vitest'
import { assertSelfContained } from '#server/reports/assertSelfContained'
import { cssString } from '#server/reports/text/cssString'
import { markdownToHtml } from '#server/reports/text/markdownToHtml'

describe('remarks in Markdown', () => {
  it('leaves raw HTML as text', () => {
    const { markup } = markdownToHtml('<script>alert(1)</script> and <b onclick=x>bold</b>')
    expect(markup).not.toMatch(/<script|<b /)
    expect(markup).toContain('&lt;script&gt;')
  })

  it('makes no image and no link, of whatever scheme', () => {
    const { markup } = markdownToHtml('![x](http://example.org/a.png) [y](javascript:alert(1)) <http://example.org> \n\n[z]: http://example.org')
    expect(markup).not.toMatch(/<img|<a |src=|href=/)
    expect(markup).toContain('http://example.org/a.png')
  })

  it('keeps headings of remarks out of the bookmarks', () => {
    expect(markdownToHtml('# Open points').markup).toBe('<p class="remark-heading">Open points</p>\n')
  })

  it('is empty for a blank text', () => {
    expect(markdownToHtml(' \n').markup).toBe('')
  })
})

describe('a text inside the style sheet', () => {
  it('can end neither the string nor the style element', () => {
    expect(cssString('a"}</style>\n\\')).toBe('"a\\22 \\7d \\3c \\2f style\\3e \\a \\5c "')
  })
})

describe('a finished document', () => {
  it.each([
    '<script>1</script>', '<meta http-equiv="refresh" content="0;url=x">', '<base href="x">', '<iframe></iframe>', '<object data="x">', '<link rel="stylesheet">', '<form>',
    '<img src="http://example.org/a.png">', '<img src=//example.org/a>', '<svg><image href="http://example.org/a"/></svg>', '<a href="file:///etc/passwd">x</a>',
    '<style>@import "x";</style>', '<style>p{background:url(http://example.org/a)}</style>', '<rect fill="url(http://example.org/#a)"/>',
  ])('is refused when it holds %s', (markup) => {
    expect(() => assertSelfContained(`<p>x</p>${markup}`)).toThrow('a report must not')
  })

  it.each(['<a href="#summary">x</a>', '<img src="data:image/png;base64,AAAA">', '<p>url(http://example.org) @import &lt;script&gt;</p>', '<rect fill="url(#hatch)"/>', '<meta http-equiv="Content-Security-Policy" content="x">'])('may hold %s', (markup) => {
    expect(() => assertSelfContained(markup)).not.toThrow()
  })
})
