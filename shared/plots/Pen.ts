import type { Dom } from '@svgdotjs/svg.js'
import type { FontFace } from './text/notoSansWidths'

export type Attributes = Record<string, string | number>

export interface TextStyle {
  size: number
  fill: string
  face?: FontFace
  anchor?: 'start' | 'middle' | 'end'
}

/** Thin spaces and thousandths of a pixel have no place in a file that is compared byte by byte. */
function fixed(value: string | number): string | number {
  return typeof value === 'number' ? Math.round(value * 100) / 100 + 0 : value
}

/**
 * What every figure draws with: one SVG.js element of a browser's page or of the server's document.
 * It only adds elements with attributes and never asks for a bounding box, a style or an id, so that the same calls give the same bytes anywhere.
 */
export class Pen {
  constructor(private readonly target: Dom) {}

  add(name: string, attributes: Attributes, text?: string): Pen {
    const element = this.target.element(name)
    for (const key in attributes) element.attr(key, fixed(attributes[key]!))
    if (text !== undefined) element.words(text)
    return new Pen(element)
  }

  group(attributes: Attributes = {}): Pen {
    return this.add('g', attributes)
  }

  /** A window with its own corner as origin, outside which nothing is seen. */
  window(x: number, y: number, width: number, height: number): Pen {
    return this.add('svg', { x, y, width, height, overflow: 'hidden' })
  }

  /** A stroked path; nothing is added for an empty one. */
  stroke(d: string, stroke: string, width: number, more: Attributes = {}): void {
    if (d) this.add('path', { d, 'fill': 'none', stroke, 'stroke-width': width, ...more })
  }

  fill(d: string, fill: string, more: Attributes = {}): void {
    if (d) this.add('path', { d, fill, ...more })
  }

  rect(x: number, y: number, width: number, height: number, attributes: Attributes): void {
    this.add('rect', { x, y, width, height, ...attributes })
  }

  circle(cx: number, cy: number, r: number, attributes: Attributes): void {
    this.add('circle', { cx, cy, r, ...attributes })
  }

  text(text: string, x: number, y: number, style: TextStyle, more: Attributes = {}): void {
    const attributes: Attributes = { x, y, 'font-size': style.size, 'fill': style.fill }
    if (style.anchor && style.anchor !== 'start') attributes['text-anchor'] = style.anchor
    if (style.face && style.face !== 'regular') attributes['font-weight'] = 600
    if (style.face === 'semiboldItalic') attributes['font-style'] = 'italic'
    this.add('text', { ...attributes, ...more }, text)
  }
}
