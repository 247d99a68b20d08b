const named: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', '\'': '&#39;' }

/** A text as HTML or SVG text or attribute value. */
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, character => named[character] ?? character)
