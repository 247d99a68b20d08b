import type { LoopTree } from '../../../tests/oracle/LoopTree'

/**
 * A plain evaluation of a tree on the axis, compiled to closures that write into places of their own: nothing is allocated while it runs, and a shared
 * sub-tree is not shared. Returns a sum over all points, so that nothing can be left out.
 */
export function plainTree(tree: LoopTree): (frequencies: Float64Array) => number {
  const values: number[] = []
  let w = 0
  const steps: (() => void)[] = []
  let memory = new Float64Array(0)
  const compile = (node: LoopTree): number => {
    const place = values.push(0, 0) - 2
    switch (node.kind) {
      case 'constant':
        steps.push(() => {
          memory[place] = node.value
          memory[place + 1] = 0
        })
        return place
      case 's':
        steps.push(() => {
          memory[place] = 0
          memory[place + 1] = w
        })
        return place
      case 'delay':
        steps.push(() => {
          memory[place] = Math.cos(w * node.seconds)
          memory[place + 1] = -Math.sin(w * node.seconds)
        })
        return place
    }
    const a = compile(node.left)
    const b = compile(node.right)
    switch (node.kind) {
      case 'sum':
        steps.push(() => {
          memory[place] = memory[a]! + memory[b]!
          memory[place + 1] = memory[a + 1]! + memory[b + 1]!
        })
        break
      case 'difference':
        steps.push(() => {
          memory[place] = memory[a]! - memory[b]!
          memory[place + 1] = memory[a + 1]! - memory[b + 1]!
        })
        break
      case 'product':
        steps.push(() => {
          const [x, y, u, v] = [memory[a]!, memory[a + 1]!, memory[b]!, memory[b + 1]!]
          memory[place] = x * u - y * v
          memory[place + 1] = x * v + y * u
        })
        break
      case 'quotient':
        steps.push(() => {
          const [x, y, u, v] = [memory[a]!, memory[a + 1]!, memory[b]!, memory[b + 1]!]
          const size = u * u + v * v
          memory[place] = (x * u + y * v) / size
          memory[place + 1] = (y * u - x * v) / size
        })
    }
    return place
  }
  const root = compile(tree)
  memory = new Float64Array(values.length)
  return (frequencies) => {
    let sum = 0
    for (let i = 0; i < frequencies.length; i += 1) {
      w = frequencies[i]!
      for (let k = 0; k < steps.length; k += 1) steps[k]!()
      sum += memory[root]! + memory[root + 1]!
    }
    return sum
  }
}
