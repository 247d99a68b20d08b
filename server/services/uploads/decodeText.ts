/** The text of an uploaded file: UTF-16 with its mark, UTF-8, or, where it is neither, the western code page that spreadsheets write. */
export function decodeText(bytes: Uint8Array): string {
  if (bytes[0] === 0xFF && bytes[1] === 0xFE) return new TextDecoder('utf-16le').decode(bytes)
  if (bytes[0] === 0xFE && bytes[1] === 0xFF) return new TextDecoder('utf-16be').decode(bytes)
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  }
  catch {
    // not UTF-8: the decoder's only other complaint
    return new TextDecoder('windows-1252').decode(bytes)
  }
}
