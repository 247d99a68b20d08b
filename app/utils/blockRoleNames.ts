import type { BlockRole } from '#shared/types/block'

/** What each role of a block is called on screen. */
export const blockRoleNames: Record<BlockRole, string> = {
  controller: 'Controller',
  filter: 'Filter',
  actuator: 'Actuator',
  plant: 'Plant',
  sensor: 'Sensor',
  delay: 'Delay',
  hold: 'Hold',
  other: 'Other',
}
