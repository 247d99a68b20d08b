import MarkdownIt from 'markdown-it'
import type { SafeHtml } from './SafeHtml'
import { safeHtml } from './SafeHtml'

/** Raw HTML, images and bare addresses stay text; links keep their words and show their address, for paper has no pointer. */
const markdown = new MarkdownIt({ html: false, linkify: false, typographer: false, breaks: false })
markdown.disable(['image', 'html_block', 'html_inline', 'link', 'autolink', 'reference'])
markdown.core.ruler.push('remark_headings', (state) => {
  // Headings of remarks are no chapters of the report: they become strong paragraphs, outside the bookmarks.
  for (const token of state.tokens) {
    if (token.type === 'heading_open') {
      token.tag = 'p'
      token.attrSet('class', 'remark-heading')
    }
    if (token.type === 'heading_close') token.tag = 'p'
  }
})

/** Remarks in Markdown as HTML that names nothing outside itself; empty for a blank text. */
export const markdownToHtml = (text: string): SafeHtml => safeHtml(text.trim() === '' ? '' : markdown.render(text))
