import { createHtmlRenderer } from './createHtmlRenderer'
import type { HtmlRenderer } from './createHtmlRenderer'
import { readAssetsFromBundle } from './readAssetsFromBundle'

let renderer: Promise<HtmlRenderer> | undefined

/** The server's one renderer: templates read and compiled at the first document. */
export const reportRenderer = (): Promise<HtmlRenderer> => {
  renderer ??= createHtmlRenderer(readAssetsFromBundle())
  return renderer
}
