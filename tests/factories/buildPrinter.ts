import type { PdfPrinter, PrintRequest } from '#server/adapters/chromium/PdfPrinter'

/** A printer in memory: gives bytes that name the document's title. `onPrint` may wait or throw in its place. */
export function buildPrinter(onPrint: (request: PrintRequest) => Promise<void> = async () => undefined): PdfPrinter {
  return {
    async print(request) {
      await onPrint(request)
      request.signal?.throwIfAborted()
      return Buffer.from(`%PDF-1.4 of ${request.title}`)
    },
    close: async () => undefined,
  }
}
