import type { SourceDefinition } from '#shared/types/source'
import type { FrequencyUnit } from '#shared/types/analysis'

/** A system of the demo as plain data; `makeDemo` stores it through the services that the screens use. */
export interface DemoSystem {
  name: string
  customer: string
  documentNumber: string
  frequencyUnit: FrequencyUnit
  description: string
  hasCustomerAccount: boolean
  conditions: { code: string, name: string, coordinates: { name: string, unit: string, value: number }[], tags: string[], notes: string }[]
  /** values in the order of the conditions */
  parameters: { name: string, unit: string, notes: string, values: number[] }[]
  loops: DemoLoop[]
  report: { title: string, documentNumber: string, remarks: string, loopRemarks: Record<string, string> }
  /** revisions to issue, oldest first; each sets parameters before it is frozen, and what the last one set stays */
  revisions: { changeNote: string, set: Record<string, number[]> }[]
}

export interface DemoLoop {
  code: string
  name: string
  axis: string
  breakPoint: string
  /** loops that are not at nominal while this one is open, by code */
  loopStates: Record<string, 'closed' | 'open'>
  notes: string
  /** of record, by the code of the condition or for all of them */
  model: { name: string, definition: Exclude<SourceDefinition, { kind: 'measured' }> } | ((values: Record<string, number>) => { name: string, definition: Exclude<SourceDefinition, { kind: 'measured' }> })
  /** conditions in which a sweep is of record and the model is set aside */
  sweeps?: DemoSweep
}

/** How the demo's measured response of a loop was made: see makeSweep. */
export interface DemoSweep {
  conditionCodes: string[]
  name: string
  reasonModelIsSetAside: string
  /** rad/s */
  from: number
  to: number
  pointsPerDecade: number
  /** stretches swept more finely, relative to a parameter of the condition: from, to, points */
  fine: { around: string, from: number, to: number, points: number }[]
  /** what the article had that the model had not: factors on parameters */
  truth: Record<string, number>
  averages: number
  /** standard deviation of the noise on the output, as a ratio of the response at its largest */
  noise: number
  seed: number
  amplitude: string
}
