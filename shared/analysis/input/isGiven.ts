/** True for a field that holds a value: in JSON, null stands for a field left out. */
export function isGiven(value: unknown): boolean {
  return value !== undefined && value !== null
}
