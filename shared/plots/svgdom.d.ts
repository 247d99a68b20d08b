/** svgdom ships no types; this is what the application uses of it. */
declare module 'svgdom' {
  /** A window whose document holds SVG elements, without layout. */
  export function createSVGWindow(): Window & { document: Document }
}
