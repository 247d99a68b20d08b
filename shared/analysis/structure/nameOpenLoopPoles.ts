import type { LoopInput } from '../../types/analysis'
import { describeOpenLoopPole, type PlanePole } from './describeOpenLoopPole'

/** Words for a pole of the loop gain. */
export function nameOpenLoopPoles(input: LoopInput, _sampleTime: number | undefined): (pole: PlanePole) => string {
  return pole => describeOpenLoopPole(pole, input.frequencyUnit ?? 'rad/s')
}
