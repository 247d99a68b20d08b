/** Names of devices, which some systems see before any point. */
const reserved = /^(con|prn|aux|nul|com\d|lpt\d)(?=\.|$)/i

/** A text as part of a file name that every system takes: letters, digits, dot, underscore, dash; at most 60 characters; never empty. */
export function fileNameOf(text: string): string {
  const plain = text.normalize('NFKD').replace(/[\u0300-\u036f]/g, '').replace(/[^A-Za-z0-9._-]+/g, '-').replace(/^[.-]+/, '').slice(0, 60).replace(/[.-]+$/, '')
  if (plain === '') return 'unnamed'
  return plain.replace(reserved, '$1_')
}

/** Gives each name once: a second one that differs at most in case gets '-2'. */
export function createNameGiver(): (name: string, extension: string) => string {
  const given = new Set<string>()
  return (name, extension) => {
    for (let count = 1; ; count++) {
      const candidate = `${name}${count === 1 ? '' : `-${count}`}${extension}`
      if (given.has(candidate.toLowerCase())) continue
      given.add(candidate.toLowerCase())
      return candidate
    }
  }
}
