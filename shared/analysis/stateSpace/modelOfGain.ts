import type { StateSpaceGain } from '../../types/block'
import { StateSpaceModel } from './StateSpaceModel'

const KEPT = 8
const models = new Map<string, StateSpaceModel>()

/** The model of a gain; the last few are kept by their numbers, as many loops name one block. */
export function modelOfGain({ a, b, c, d, sampleTime }: StateSpaceGain): StateSpaceModel {
  const key = JSON.stringify([a, b, c, d, sampleTime !== undefined])
  const known = models.get(key)
  const model = known ?? new StateSpaceModel({ a, b, c, d, ...sampleTime !== undefined && { sampleTime } })
  models.delete(key)
  models.set(key, model)
  for (const oldest of models.keys()) {
    if (models.size <= KEPT) break
    models.delete(oldest)
  }
  return model
}
