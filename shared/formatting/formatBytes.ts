/** A size in words: '812 bytes', '14.2 kB', '3.10 MB' (1 kB = 1000 bytes). */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`
  const [scale, unit] = bytes < 999_500 ? [1e3, 'kB'] : [1e6, 'MB']
  return `${(bytes / scale).toPrecision(3)} ${unit}`
}
