/** A loop gain as a tree: what the engine reads as a typed expression and the oracle encloses directly. */
export type LoopTree
  = | { kind: 'constant', value: number }
    | { kind: 's' }
    | { kind: 'delay', seconds: number }
    | { kind: 'sum' | 'difference' | 'product' | 'quotient', left: LoopTree, right: LoopTree }

export const constant = (value: number): LoopTree => ({ kind: 'constant', value })
export const s: LoopTree = { kind: 's' }
export const delay = (seconds: number): LoopTree => ({ kind: 'delay', seconds })
export const sum = (left: LoopTree, right: LoopTree): LoopTree => ({ kind: 'sum', left, right })
export const difference = (left: LoopTree, right: LoopTree): LoopTree => ({ kind: 'difference', left, right })
export const product = (left: LoopTree, right: LoopTree): LoopTree => ({ kind: 'product', left, right })
export const quotient = (left: LoopTree, right: LoopTree): LoopTree => ({ kind: 'quotient', left, right })

/** A polynomial in Horner's form, highest power first. */
export function polynomial(highestFirst: number[]): LoopTree {
  return highestFirst.slice(1).reduce<LoopTree>((tree, c) => c === 0 ? product(tree, s) : sum(product(tree, s), constant(c)), constant(highestFirst[0]!))
}

const SYMBOLS = { sum: '+', difference: '-', product: '*', quotient: '/' }

/** The tree as a typed expression in s. */
export function expressionOf(tree: LoopTree): string {
  switch (tree.kind) {
    case 'constant': return `(${tree.value})`
    case 's': return 's'
    case 'delay': return `exp(-${tree.seconds}*s)`
    default: return `(${expressionOf(tree.left)} ${SYMBOLS[tree.kind]} ${expressionOf(tree.right)})`
  }
}
