/** The header that names a file for saving (or shows it in place): an ASCII name for old readers, the true one beside it (RFC 6266). */
export function contentDisposition(kind: 'attachment' | 'inline', fileName: string): string {
  const plain = fileName.replace(/[^A-Za-z0-9._ -]/g, '_')
  const encoded = encodeURIComponent(fileName).replace(/['()*]/g, character => `%${character.charCodeAt(0).toString(16).toUpperCase()}`)
  return `${kind}; filename="${plain}"; filename*=UTF-8''${encoded}`
}
