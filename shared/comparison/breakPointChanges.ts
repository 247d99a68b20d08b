import { describeBreakPoint } from '../formatting/describeBreakPoint'
import type { ReportSnapshot, SnapshotLoop } from '../types/snapshot'

/** Loops of both frozen states that are opened elsewhere, or with other loops in another state, in the later one: their title lines before and after. */
export function breakPointChanges(before: ReportSnapshot, after: ReportSnapshot): string[] {
  return after.loops.flatMap((loop) => {
    const was = before.loops.find(({ code }) => code === loop.code)
    if (was === undefined) return []
    const [old, now] = [titleLine(was), titleLine(loop)]
    return old === now ? [] : [`${loop.code}: ${old} to ${now}`]
  })
}

const titleLine = ({ breakPoint, breakAt = null, otherLoops, loopStates = [] }: SnapshotLoop) => describeBreakPoint({ breakPoint, breakAt, otherLoops, states: loopStates })
