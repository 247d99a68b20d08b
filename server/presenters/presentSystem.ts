import type { System } from '#shared/types/system'
import type { SystemRow } from '../database/models/SystemRow'

export const presentSystem = ({ id, version, name, customer, documentNumber, frequencyUnit, description }: SystemRow): System =>
  ({ id, version, name, customer, documentNumber, frequencyUnit, description })
