import { newConditionSchema } from '#shared/schemas/condition'
import { newLoopSchema } from '#shared/schemas/loop'
import { newSystemSchema } from '#shared/schemas/system'
import type { Source, SourceDefinition } from '#shared/types/source'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { createCondition } from '#server/services/conditions/createCondition'
import type { ServiceContext } from '#server/services/context'
import { createLoop } from '#server/services/loops/createLoop'
import { createSources } from '#server/services/sources/createSources'
import { createSystem } from '#server/services/systems/createSystem'

let count = 0

export const buildSystem = (context: ServiceContext, fields: Partial<Parameters<typeof createSystem>[0]> = {}): Promise<System> =>
  createSystem(newSystemSchema.parse({ name: `System ${++count}`, frequencyUnit: 'rad/s', ...fields }), context)

export const buildLoop = (systemId: number, context: ServiceContext, fields: Partial<Parameters<typeof createLoop>[1]> = {}): Promise<Loop> =>
  createLoop(systemId, newLoopSchema.parse({ code: `L${++count}`, name: `Loop ${count}`, breakPoint: 'torque command', otherLoops: 'all closed', ...fields }), context)

export const buildCondition = (systemId: number, context: ServiceContext, fields: Partial<Parameters<typeof createCondition>[1]> = {}): Promise<OperatingCondition> =>
  createCondition(systemId, newConditionSchema.parse({ code: `C${++count}`, name: `Condition ${count}`, ...fields }), context)

/**
 * 2/(s (s + 1)^2) crosses -180 deg where atan w = 45 deg, w = 1, with |L| = 2/(1 * 2) = 1: on the verge. With a gain of one in place of two the
 * gain margin is 6.02 dB: closed form, derived here.
 */
export const sixDecibelLoop: SourceDefinition = { kind: 'coefficients', numerator: [1], denominator: [1, 2, 1, 0] }

/** A source of record of a loop in one condition. */
export async function buildSource(loopId: number, conditionId: number, context: ServiceContext, definition: SourceDefinition = sixDecibelLoop): Promise<Source> {
  const [source] = await createSources(loopId, { conditionIds: [conditionId], name: `design model ${++count}`, definition, ofRecord: true, setAsideReason: '' }, context)
  return source as Source
}
