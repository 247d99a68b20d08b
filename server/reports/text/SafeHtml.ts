const brand = Symbol('safe HTML')

/** Markup made by our own figure code or by the Markdown renderer: the only text that enters the document unescaped. */
export interface SafeHtml {
  readonly [brand]: true
  readonly markup: string
}

/** Marks a text as markup. Only for what our own code has put together; never for a text that a person typed. */
export const safeHtml = (markup: string): SafeHtml => ({ [brand]: true, markup })

export const isSafeHtml = (value: unknown): value is SafeHtml => typeof value === 'object' && value !== null && brand in value
