import Handlebars from 'handlebars'
import { assertSelfContained } from './assertSelfContained'
import { fontFacesFor } from './fonts/fontFacesFor'
import { pageRules } from './pageRules'
import type { ReportAssets } from './ReportAssets'
import { isSafeHtml, safeHtml } from './text/SafeHtml'
import type { ReportView, TableCell } from './view/ReportView'

const partials = ['cover', 'front', 'table', 'cell', 'cellText', 'figure', 'summary', 'matrix', 'chapter', 'condition', 'section'] as const
const styles = ['type', 'cover', 'tables', 'sections', 'screen', 'print'] as const

const placeOfStyles = '/* styles */'

export type HtmlRenderer = (view: ReportView) => Promise<string>

/** Helpers only format; the one that writes markup takes nothing but what our own code has branded as such. */
function helpersOf(environment: typeof Handlebars) {
  return {
    html: (value: unknown) => {
      if (!isSafeHtml(value)) throw new TypeError('only markup made by the report itself may enter the document unescaped')
      return new environment.SafeString(value.markup)
    },
    at: (list: readonly unknown[], index: number) => list[index],
    toneClass: (cell: TableCell) => `tone-${cell.tone ?? 'plain'}`,
  }
}

/**
 * Reads and compiles the templates once and returns the step that lays a view out as one HTML file, with its fonts, styles and
 * figures inside. The same view gives the same bytes. Throws where a template names a field the view lacks.
 */
export async function createHtmlRenderer(assets: ReportAssets): Promise<HtmlRenderer> {
  const environment = Handlebars.create()
  const helpers = helpersOf(environment)
  for (const [name, helper] of Object.entries(helpers)) environment.registerHelper(name, helper)
  const options = { strict: true, knownHelpersOnly: true, knownHelpers: { html: true, at: true, toneClass: true } }
  const compile = async (path: string) => environment.compile<Record<string, unknown>>(await assets.template(path), options)
  for (const name of partials) environment.registerPartial(name, await compile(`partials/${name}.hbs`))
  const layout = await compile('layout.hbs')
  const sheets = (await Promise.all(styles.map(name => assets.template(`styles/${name}.css`)))).join('\n')

  return async (view) => {
    const hasRemarks = view.remarks.markup !== ''
    const body = layout({ view, hasRemarks, styles: safeHtml(placeOfStyles) })
    const fonts = await fontFacesFor(body + JSON.stringify(view.runningHead) + view.chapters.map(chapter => chapter.code + chapter.name).join(''), assets)
    // The fonts depend on the letters of the document, so the styles are put in after it is laid out.
    const html = body.replace(placeOfStyles, () => [fonts, sheets, pageRules(view)].join('\n'))
    assertSelfContained(html)
    return html
  }
}
