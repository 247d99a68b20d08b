/** The files the document is made with: templates and fonts, wherever the program keeps them. */
export interface ReportAssets {
  /** A file under templates/report, such as 'partials/cover.hbs'. Throws where it is missing. */
  template: (path: string) => Promise<string>
  /** The bytes of a font file of one of the font packages. */
  font: (fontPackage: string, file: string) => Promise<Buffer>
}
