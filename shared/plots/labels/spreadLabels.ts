export interface SpreadLabel {
  /** px, where it would stand alone: its middle */
  x: number
  /** px */
  width: number
  /** The greater stays where there is no room for all. */
  weight: number
}

/**
 * Moves labels on one line apart so that none overlap, each as little as can be; `most` is how far (px) one may move.
 * Labels for which there is no room, the least weighty first, get null. Result: the middle of each, in the order given.
 */
export function spreadLabels(labels: readonly SpreadLabel[], from: number, to: number, gap: number, most: number): (number | null)[] {
  const result: (number | null)[] = labels.map(() => null)
  let order = (labels.length > crowd ? thinned(labels, gap, most) : labels.map((_, i) => i)).sort((a, b) => labels[a]!.x - labels[b]!.x || a - b)
  for (;;) {
    const middles = settle(order.map(i => labels[i]!), from, to, gap)
    let drop = -1
    order.forEach((index, k) => {
      if (Math.abs(middles[k]! - labels[index]!.x) <= most) return
      // The least of the crowd around the one that would have to move too far.
      order.forEach((other, j) => {
        const near = Math.abs(middles[j]! - middles[k]!) <= most + labels[index]!.width
        if (near && (drop < 0 || labels[other]!.weight < labels[drop]!.weight)) drop = other
      })
    })
    if (drop < 0) {
      order.forEach((index, k) => (result[index] = middles[k]!))
      return result
    }
    order = order.filter(index => index !== drop)
  }
}

/** Beyond this many labels those that cannot find room are left out first: what follows grows with the cube of their number. */
const crowd = 200

/** Of each stretch `most` wide the weightiest labels, as many as could stand there if each moved as far as it may. */
function thinned(labels: readonly SpreadLabel[], gap: number, most: number): number[] {
  const stretches = new Map<number, number[]>()
  labels.forEach(({ x }, index) => {
    const stretch = Math.floor(x / most)
    const indices = stretches.get(stretch)
    if (indices) indices.push(index)
    else stretches.set(stretch, [index])
  })
  return [...stretches.values()].flatMap((indices) => {
    const narrowest = indices.reduce((least, index) => Math.min(least, labels[index]!.width), Infinity)
    const room = Math.ceil(3 * most / (narrowest + gap)) + 1
    return indices.sort((a, b) => labels[b]!.weight - labels[a]!.weight || a - b).slice(0, room)
  })
}

/** Blocks of touching labels, each block as near to the wishes of its labels as can be in the mean. */
function settle(labels: SpreadLabel[], from: number, to: number, gap: number): number[] {
  const blocks: { start: number, length: number, wish: number, members: SpreadLabel[] }[] = []
  for (const label of labels) {
    let block = { start: 0, length: label.width, wish: label.x - label.width / 2, members: [label] }
    block.start = clamp(block.wish, from, to - block.length)
    for (let before = blocks.at(-1); before && before.start + before.length + gap > block.start; before = blocks.at(-1)) {
      blocks.pop()
      const [n, m] = [before.members.length, block.members.length]
      const length = before.length + gap + block.length
      const wish = (before.wish * n + (block.wish - before.length - gap) * m) / (n + m)
      block = { start: clamp(wish, from, to - length), length, wish, members: [...before.members, ...block.members] }
    }
    blocks.push(block)
  }
  return blocks.flatMap(({ start, members }) => {
    let at = start
    return members.map(({ width }) => {
      const middle = at + width / 2
      at += width + gap
      return middle
    })
  })
}

function clamp(value: number, low: number, high: number): number {
  return Math.max(low, Math.min(Math.max(low, high), value))
}
