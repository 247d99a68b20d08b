import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { createCondition } from '../services/conditions/createCondition'
import type { ServiceContext } from '../services/context'
import { createLoop } from '../services/loops/createLoop'
import { updateLoop } from '../services/loops/updateLoop'
import { replaceMembers } from '../services/members/replaceMembers'
import { replaceParameters } from '../services/parameters/replaceParameters'
import { createSources } from '../services/sources/createSources'
import { createSystem } from '../services/systems/createSystem'
import accounts from './accounts.json'
import type { DemoLoop, DemoSystem } from './DemoSystem'
import { storeDemoBlocks } from './storeDemoBlocks'
import { storeDemoSweeps } from './storeDemoSweeps'

/** Stores a system of the demo through the same services as the screens: members, conditions, parameters, blocks, loops, sources. */
export async function storeDemoSystem(demo: DemoSystem, context: ServiceContext): Promise<System> {
  const { name, customer, documentNumber, frequencyUnit, description } = demo
  const system = await createSystem({ name, customer, documentNumber, frequencyUnit, description }, context)
  const members = accounts.people.filter(person => person.roles.length > 0 && (demo.hasCustomerAccount || !person.roles.includes('customer')))
  await replaceMembers(system.id, members.map(({ email, roles }) => ({ email, roles: roles as ('engineer' | 'checker' | 'approver' | 'customer')[] })), context)
  const conditions: OperatingCondition[] = []
  for (const condition of demo.conditions) conditions.push(await createCondition(system.id, condition, context))
  await replaceParameters(system.id, demo.parameters.map(({ values, ...parameter }) => ({
    ...parameter,
    values: Object.fromEntries(conditions.map((condition, index) => [condition.id, values[index] ?? Number.NaN])),
  })), context)
  await storeDemoBlocks(system, demo, conditions, context)
  const loops = new Map<string, Loop>()
  for (const loop of demo.loops) loops.set(loop.code, await storeDemoLoop(system, demo, loop, conditions, context))
  for (const { code, loopStates } of demo.loops) await storeDemoStates(loops, code, loopStates, context)
  return system
}

async function storeDemoLoop(system: System, demo: DemoSystem, loop: DemoLoop, conditions: OperatingCondition[], context: ServiceContext): Promise<Loop> {
  const { code, name, axis, breakPoint, breakAt, notes, model, setAside = [], sweeps } = loop
  const stored = await createLoop(system.id, { code, name, axis, breakPoint, otherLoops: '', breakAt, loopStates: [], notes }, context)
  const conditionIds = conditions.map(condition => condition.id)
  await createSources(stored.id, { conditionIds, ...model, ofRecord: true, setAsideReason: '' }, context)
  for (const { reason, ...source } of setAside) await createSources(stored.id, { conditionIds, ...source, ofRecord: false, setAsideReason: reason }, context)
  if (sweeps !== undefined) await storeDemoSweeps(system, demo, loop, sweeps, stored.id, conditions, context)
  return stored
}

/** What the others do while a loop is open, once all of them are there. */
async function storeDemoStates(loops: ReadonlyMap<string, Loop>, code: string, states: DemoLoop['loopStates'], context: ServiceContext): Promise<void> {
  const loopOf = (wanted: string) => {
    const loop = loops.get(wanted)
    if (loop === undefined) throw new Error(`The demo has no loop ${wanted}.`)
    return loop
  }
  const { id, version } = loopOf(code)
  await updateLoop(id, { version, loopStates: Object.entries(states).map(([other, state]) => ({ loopId: loopOf(other).id, state })) }, context)
}
