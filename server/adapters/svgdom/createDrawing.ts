import { registerWindow, SVG } from '@svgdotjs/svg.js'
import type { Dom } from '@svgdotjs/svg.js'
import { createSVGWindow } from 'svgdom'

const svgNamespace = 'http://www.w3.org/2000/svg'

/** One document for all figures of the process; each is drawn into an element of its own that is never attached to it. */
const window = createSVGWindow()

/**
 * An empty <svg> to draw into on the server. SVG.js finds its document by a global, so the caller draws at once: nothing is awaited between this
 * and the last element.
 */
export function createDrawing(): Dom {
  registerWindow(window, window.document)
  return SVG(window.document.createElementNS(svgNamespace, 'svg')) as unknown as Dom
}
