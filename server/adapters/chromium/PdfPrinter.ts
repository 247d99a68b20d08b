/** One document to print: a whole HTML file that needs nothing beside itself. */
export interface PrintRequest {
  html: string
  /** what the document's <title> must still be when it is printed */
  title: string
  /** both dates inside the PDF: the revision's own time, so that printing it again gives the same bytes */
  time: Date
  signal?: AbortSignal
}

/** The machine that turns a finished HTML document into a PDF. */
export interface PdfPrinter {
  /** Throws an AppError 'unavailable' in words when the machine is missing or fails twice; the signal's reason when it is aborted. */
  print: (request: PrintRequest) => Promise<Buffer>
  close: () => Promise<void>
}
