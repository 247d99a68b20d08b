import type { BlockGain } from '#shared/types/block'
import { expressionOf, type LoopTree } from './LoopTree'

/** The same loop gain built from blocks: each proper quotient is a block of its own, those inside others among them. */
export function blocksOfTree(tree: LoopTree, sampleTime: number | undefined): { expression: string, blocks: Record<string, BlockGain> } {
  const blocks: Record<string, BlockGain> = {}
  const written = (text: string) => sampleTime === undefined ? text : text.replaceAll(/\bs\b/g, 'z')
  const symbols = { sum: '+', difference: '-', product: '*', quotient: '/' }
  const textOf = (node: LoopTree): string => {
    if (node.kind === 'constant' || node.kind === 's' || node.kind === 'delay') return written(expressionOf(node))
    const text = `(${textOf(node.left)} ${symbols[node.kind]} ${textOf(node.right)})`
    if (node.kind !== 'quotient' || excess(node) > 0) return text
    const name = `B${Object.keys(blocks).length + 1}`
    blocks[name] = { kind: 'expression', expression: text, ...sampleTime !== undefined && { sampleTime } }
    return name
  }
  return { expression: textOf(tree), blocks }
}

/** Degree of the numerator less that of the denominator, where nothing cancels at infinity. */
function excess(tree: LoopTree): number {
  switch (tree.kind) {
    case 's': return 1
    case 'constant':
    case 'delay': return 0
    case 'product': return excess(tree.left) + excess(tree.right)
    case 'quotient': return excess(tree.left) - excess(tree.right)
    default: return Math.max(excess(tree.left), excess(tree.right))
  }
}
