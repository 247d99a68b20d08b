import { AppError } from '#shared/errors/AppError'

const forbidden = /<(?:script|base|iframe|frame|object|embed|link|form|meta\s+http-equiv=(?!"Content-Security-Policy"))[\s>/=]?/i
const tag = /<[a-z][^<>]*>/gi
const attribute = /\s([\w:-]+)\s*=\s*(?:"([^"]*)"|'([^']*)'|([^\s"'>]+))/g
const foreignStyle = /@import|url\(\s*["']?(?!#|data:)[^)]*/i

const referring = new Set(['src', 'href', 'xlink:href', 'srcset', 'data', 'poster', 'action', 'background'])
const styling = new Set(['style', 'fill', 'stroke', 'clip-path', 'mask', 'filter', 'marker-start', 'marker-mid', 'marker-end'])

/** What an attribute names outside the document; null where it names nothing. */
function foreignIn(name: string, value: string): string | null {
  if (referring.has(name) && !value.startsWith('#') && !value.startsWith('data:')) return `${name}="${value.slice(0, 60)}"`
  return styling.has(name) ? foreignStyle.exec(value)?.[0] ?? null : null
}

function foreignReference(markup: string): string | null {
  for (const [text] of markup.matchAll(tag)) {
    for (const [, name = '', double, single, bare] of text.matchAll(attribute)) {
      const found = foreignIn(name.toLowerCase(), double ?? single ?? bare ?? '')
      if (found !== null) return found
    }
  }
  for (const [, sheet = ''] of markup.matchAll(/<style>([\s\S]*?)<\/style>/gi)) {
    const found = foreignStyle.exec(sheet)
    if (found) return found[0]
  }
  return null
}

/**
 * Throws an AppError when a finished document holds an element that runs, loads or redirects, or names anything outside itself.
 * A second lock: the templates escape what people typed, and the printer's network is closed.
 */
export function assertSelfContained(html: string): void {
  // Font and image data are long and hold no markup.
  const markup = html.replace(/base64,[A-Za-z0-9+/=]+/g, 'base64,')
  const found = forbidden.exec(markup)?.[0] ?? foreignReference(markup)
  if (found !== null) throw new AppError('unexpected', `The document holds '${found}', which a report must not: it is not printed.`)
}
