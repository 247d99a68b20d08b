import { cssString } from './text/cssString'
import type { ReportView } from './view/ReportView'

const box = (name: string, content: string, more = '') => `@${name}{content:${content};font:400 7.5pt 'Noto Sans','Noto Sans Math',sans-serif;color:#51607a;${more}}`

/**
 * The page boxes of one document: size, margins, running head with document number and revision, 'page n of m' at the foot,
 * and on a chapter's pages the loop's code and name. Page margin boxes use the document's own font and stay out of the tags.
 */
export function pageRules({ pageSize, accent, stamp, runningHead, chapters }: ReportView): string {
  const colour = /^#[0-9a-fA-F]{6}$/.test(accent) ? accent : '#13233F'
  const status = stamp === null ? '' : box('top-center', cssString(stamp), 'font-weight:600;color:#13233f;letter-spacing:0.1em;')
  return [
    `:root{--accent:${colour}}`,
    `@page{size:${pageSize === 'Letter' ? 'letter' : 'A4'};margin:22mm 18mm 18mm 20mm;`
    + box('top-left', cssString(runningHead.left), 'font-weight:600;color:#13233f;')
    + status
    + box('top-right', cssString(runningHead.right))
    + box('bottom-left', cssString(runningHead.foot))
    + box('bottom-right', '"page " counter(page) " of " counter(pages)')
    + '}',
    '@page cover{margin-top:20mm;@top-left{content:none}@top-center{content:none}@top-right{content:none}}',
    ...chapters.map(({ pageName, code, name }) => `@page ${pageName}{@top-right{content:${cssString(`${code} ${name}`)}}}\n.page-${pageName}{page:${pageName}}`),
  ].join('\n')
}
