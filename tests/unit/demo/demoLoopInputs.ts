import type { DemoSystem } from '#server/demo/DemoSystem'
import { valuesIn } from '#server/demo/valuesIn'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { LoopInput } from '#shared/types/analysis'

export interface DemoCase { key: string, input: LoopInput }

/** The design model of every loop of a demo system in every condition as the engine takes it, and what its sweeps were made from. */
export function demoLoopInputs(demo: DemoSystem): DemoCase[] {
  return demo.loops.flatMap(loop => demo.conditions.flatMap(({ code }, index) => {
    const inputAt = (parameters: Record<string, number>): LoopInput => {
      const { definition } = typeof loop.model === 'function' ? loop.model(parameters) : loop.model
      return loopInputFromDefinition(definition, { frequencyUnit: demo.frequencyUnit, parameters, points: [] })
    }
    const values = valuesIn(demo, index)
    const { sweeps } = loop
    return [
      { key: `${loop.code} in ${code}`, input: inputAt(values) },
      ...(sweeps?.conditionCodes.includes(code)
        ? [{ key: `${loop.code} in ${code}, as swept`, input: inputAt(Object.fromEntries(Object.entries(values).map(([name, value]) => [name, value * (sweeps.truth[name] ?? 1)]))) }]
        : []),
    ]
  }))
}
