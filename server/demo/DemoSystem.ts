import type { BlockDefinition, BlockRole } from '#shared/types/block'
import type { ExpressionDefinition } from '#shared/types/source'
import type { BreakAt } from '#shared/types/system'
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
  blocks: DemoBlock[]
  loops: DemoLoop[]
  report: { title: string, documentNumber: string, remarks: string, loopRemarks: Record<string, string> }
  /** revisions to issue, oldest first; each sets parameters before it is frozen, and what the last one set stays */
  revisions: { changeNote: string, set: Record<string, number[]> }[]
}

export interface DemoBlock {
  name: string
  role: BlockRole
  unitIn: string
  unitOut: string
  notes: string
  /** the same in every condition, or one for each */
  gain: BlockDefinition | ((place: DemoPlace) => BlockDefinition)
  /** the file that its gains are read from */
  file?: { name: string, text: string }
}

/** An operating condition as the gain of a block is made for it. */
export interface DemoPlace {
  code: string
  /** of the condition in the list */
  index: number
  /** of the parameters, by name */
  values: Record<string, number>
  /** id of the block's file; 0 where it has none */
  uploadId: number
}

/** A source that is an expression over blocks, the same in every condition. */
export interface DemoSource {
  name: string
  definition: ExpressionDefinition
}

export interface DemoLoop {
  code: string
  name: string
  axis: string
  breakPoint: string
  breakAt: BreakAt
  /** loops that are not at nominal while this one is open, by code */
  loopStates: Record<string, 'closed' | 'open'>
  notes: string
  /** of record wherever no sweep is */
  model: DemoSource
  /** kept beside it, with why they are not of record */
  setAside?: (DemoSource & { reason: string })[]
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
