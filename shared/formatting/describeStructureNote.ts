import type { StructureNote } from '../types/analysis'

/** A note on how the loop gain was built, with the block it is about: 'G: two states cannot be reached from the input.' */
export function describeStructureNote({ block, message }: StructureNote): string {
  return block === '' ? message : `${block}: ${message}`
}
