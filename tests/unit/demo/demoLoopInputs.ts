import type { DemoSystem } from '#server/demo/DemoSystem'
import { gainsIn } from '#server/demo/gainsIn'
import { valuesIn } from '#server/demo/valuesIn'
import type { ExpressionInput } from '#shared/types/analysis'

export interface DemoCase { key: string, input: ExpressionInput }

/** The design model of every loop of a demo system in every condition as the engine takes it, and what its sweeps were made from. */
export function demoLoopInputs(demo: DemoSystem): DemoCase[] {
  return demo.loops.flatMap(({ code: loop, model, setAside = [], sweeps }) => demo.conditions.flatMap(({ code }, index) => {
    const inputAt = (parameters: Record<string, number>, expression = model.definition.expression): ExpressionInput =>
      ({ frequencyUnit: demo.frequencyUnit, expression, parameters, blocks: gainsIn(demo, index, parameters) })
    const values = valuesIn(demo, index)
    return [
      { key: `${loop} in ${code}`, input: inputAt(values) },
      ...setAside.map(({ name, definition }) => ({ key: `${loop} in ${code}, ${name}`, input: inputAt(values, definition.expression) })),
      ...(sweeps?.conditionCodes.includes(code)
        ? [{ key: `${loop} in ${code}, as swept`, input: inputAt(Object.fromEntries(Object.entries(values).map(([name, value]) => [name, value * (sweeps.truth[name] ?? 1)]))) }]
        : []),
    ]
  }))
}
