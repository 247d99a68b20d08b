import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'
import { namesNeeded, type NamesNeeded } from '#shared/sources/namesNeeded'
import type { Block, BlockDefinition, BlockGain } from '#shared/types/block'
import type { System } from '#shared/types/system'
import { resolveBlockGain } from './resolveBlockGain'

/** The blocks of a system by name, their gains read from what is stored where they are asked for, each definition once. */
export class BlockGains {
  private readonly blocks: ReadonlyMap<string, Block>
  private readonly system: Pick<System, 'id' | 'frequencyUnit'>
  private readonly resolved = new Map<BlockDefinition, Promise<BlockGain>>()

  constructor(blocks: readonly Block[], system: Pick<System, 'id' | 'frequencyUnit'>) {
    this.blocks = new Map(blocks.map(block => [block.name, block]))
    this.system = system
  }

  get names(): string[] {
    return [...this.blocks.keys()]
  }

  /** How a block is given in a condition: its own gain there, or else that of all conditions; null where it has none, undefined where there is no such block. */
  definitionIn(conditionId: number, name: string): BlockDefinition | null | undefined {
    const block = this.blocks.get(name)
    return block && (block.byCondition[conditionId] ?? block.definition)
  }

  /** The blocks and other names an expression needs in a condition. */
  neededIn(conditionId: number, expression: string): NamesNeeded {
    return namesNeeded(expression, name => this.definitionIn(conditionId, name))
  }

  /** The gain of a block in a condition. Throws AnalysisInputError at `blocks.<name>` where it has none or what is stored cannot be read. */
  async gainIn(condition: { id: number, code: string }, name: string): Promise<BlockGain> {
    const definition = this.definitionIn(condition.id, name)
    if (!definition) throw new AnalysisInputError(`The block ${name} has no gain in the condition ${condition.code}.`, `blocks.${name}`)
    let gain = this.resolved.get(definition)
    if (!gain) {
      gain = resolveBlockGain(definition, this.system)
      this.resolved.set(definition, gain)
    }
    try {
      return await gain
    }
    catch (error) {
      if (!(error instanceof AnalysisInputError || error instanceof AppError)) throw error
      throw new AnalysisInputError(`The block ${name}: ${error.message}`, `blocks.${name}.${error.path ?? ''}`)
    }
  }

  /** The gains of all blocks that have one in a condition and can be read. */
  async allIn(condition: { id: number, code: string }): Promise<Record<string, BlockGain>> {
    const entries = await Promise.all(this.names.map(async name => [name, await this.gainIn(condition, name).catch(unlessUnreadable)] as const))
    return Object.fromEntries(entries.flatMap(([name, gain]) => gain === null ? [] : [[name, gain]]))
  }
}

function unlessUnreadable(error: unknown): null {
  if (error instanceof AnalysisInputError) return null
  throw error
}
