import { AppError } from '#shared/errors/AppError'

const forbidden = /<(script|base|iframe|frame|object|embed|link|form|meta\s+http-equiv=(?!"Content-Security-Policy"))[\s>/=]?/i
const reference = /\b(?:src|xlink:href|href)\s*=\s*["']?(?!["']?(?:#|data:))[^\s"'>]/i
const styleReference = /@import|url\(\s*["']?(?!#|data:)/i

/**
 * Throws an AppError when a finished document holds an element that runs, loads or redirects, or names anything outside itself.
 * A second lock: the templates escape what people typed, and the printer's network is closed.
 */
export function assertSelfContained(html: string): void {
  // Font and image data are long and hold no markup.
  const markup = html.replace(/base64,[A-Za-z0-9+/=]+/g, 'base64,')
  const found = forbidden.exec(markup) ?? reference.exec(markup) ?? styleReference.exec(textWithinStyles(markup))
  if (found) throw new AppError('unexpected', `The document holds '${found[0]}', which a report must not: it is not printed.`)
}

const textWithinStyles = (markup: string) => [...markup.matchAll(/<style>([\s\S]*?)<\/style>|style="([^"]*)"|(?:fill|stroke|clip-path|mask|filter)="([^"]*)"/g)].map(match => match[1] ?? match[2] ?? match[3] ?? '').join('\n')
