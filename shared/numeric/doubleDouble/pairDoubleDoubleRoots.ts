import type { DoubleDoubleRoots } from './DoubleDoubleRoots'

/** Makes roots of a real polynomial that were found one by one exactly real or exactly conjugate: the farthest from the real axis first, each with what is nearest to its mirror image. */
export function pairDoubleDoubleRoots({ re, reLow, im, imLow }: DoubleDoubleRoots): void {
  const n = re.length
  const paired = new Uint8Array(n)
  const order = Array.from({ length: n }, (_, k) => k).sort((i, j) => Math.abs(im[j]!) - Math.abs(im[i]!))
  for (const k of order) {
    if (paired[k]) continue
    paired[k] = 1
    let nearest = -1
    let smallest = Infinity
    for (let j = 0; j < n; j++) {
      if (paired[j]) continue
      const distance = Math.hypot(re[k]! - re[j]!, im[k]! + im[j]!)
      if (distance >= smallest) continue
      smallest = distance
      nearest = j
    }
    if (nearest < 0 || smallest >= Math.abs(im[k]!)) {
      im[k] = 0
      imLow[k] = 0
      continue
    }
    paired[nearest] = 1
    re[nearest] = re[k]!
    reLow[nearest] = reLow[k]!
    im[nearest] = -im[k]!
    imLow[nearest] = -imLow[k]!
  }
}
