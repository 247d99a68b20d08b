/** Channels as they are typed: their names, or numbers where several are only counted. */
export function channelsAsText(names: readonly string[], count = names.length): string {
  if (names.length > 0) return names.join(', ')
  return count > 1 ? Array.from({ length: count }, (_, index) => index + 1).join(', ') : ''
}
