import type { ComplexPair } from '#shared/types/analysis'

/** Roots as they are typed, one a line, conjugate pairs on one: '-2', '-1 ± 3'. */
export function rootsAsText(roots: readonly ComplexPair[]): string {
  const left = [...roots]
  const lines: string[] = []
  for (let root = left.shift(); root !== undefined; root = left.shift()) {
    const [re, im] = root
    const partner = im === 0 ? -1 : left.findIndex(other => other[0] === re && other[1] === -im)
    if (partner >= 0) left.splice(partner, 1)
    lines.push(im === 0 ? String(re) : partner >= 0 ? `${re} ± ${Math.abs(im)}` : `${re} ${im}`)
  }
  return lines.join('\n')
}
