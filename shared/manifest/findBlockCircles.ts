import { circleInWords } from '../analysis/blocks/circleInWords'
import { namesInExpression } from '../analysis/expressions/namesInExpression'
import type { InputFault } from '../schemas/readBySchema'
import type { ManifestBlock } from '../types/manifest'

type Definition = NonNullable<ManifestBlock['definition']>

/** Blocks whose expressions name one another in a circle, in all conditions or in one, each told where the circle is closed. */
export function findBlockCircles(blocks: readonly ManifestBlock[]): InputFault[] {
  const needed = new Map<Definition, string[]>()
  const namesIn = (definition: Definition): string[] => {
    if (definition.kind !== 'expression') return []
    const known = needed.get(definition) ?? [...new Set(namesInExpression(definition.expression).map(({ name }) => name))]
    needed.set(definition, known)
    return known
  }
  const faults = new Map<string, InputFault>()
  // Wherever no block has a gain of its own, all conditions are alike: they stand for the one without a code.
  for (const code of new Set([null, ...blocks.flatMap(({ byCondition }) => Object.keys(byCondition))])) {
    for (const fault of circlesIn(blocks, code, namesIn)) faults.set(fault.path, fault)
  }
  return [...faults.values()]
}

function circlesIn(blocks: readonly ManifestBlock[], code: string | null, namesIn: (definition: Definition) => string[]): InputFault[] {
  const isOwn = (block: ManifestBlock) => code !== null && Object.hasOwn(block.byCondition, code)
  const places = new Map(blocks.map((block, index) => [block.name, { index, own: isOwn(block), definition: isOwn(block) ? block.byCondition[code ?? ''] : block.definition }]))
  const state = new Map<string, 'open' | 'done'>()
  const way: string[] = []
  const faults: InputFault[] = []
  const visit = (name: string) => {
    const place = places.get(name)
    if (!place) return
    state.set(name, 'open')
    way.push(name)
    for (const next of place.definition ? namesIn(place.definition) : []) {
      if (state.get(next) === 'open') {
        const circle = way.slice(way.indexOf(next))
        faults.push({
          path: `blocks[${place.index}].${place.own ? `byCondition.${code}` : 'definition'}.expression`,
          message: circleInWords(circle),
        })
      }
      else if (!state.has(next)) visit(next)
    }
    way.pop()
    state.set(name, 'done')
  }
  for (const { name } of blocks) if (!state.has(name)) visit(name)
  return faults
}
