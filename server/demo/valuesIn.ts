import type { DemoSystem } from './DemoSystem'

/** The values of all parameters of the demo's system in the condition of this index, by name. */
export function valuesIn(demo: DemoSystem, index: number): Record<string, number> {
  return Object.fromEntries(demo.parameters.map(parameter => [parameter.name, parameter.values[index] ?? Number.NaN]))
}
