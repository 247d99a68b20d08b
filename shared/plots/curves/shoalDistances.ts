/** Distances to -1 at which the shoals end, the widest first: one, the criterion, and one between them. */
export function shoalDistances(required: number | null): number[] {
  if (required === null) return [1, 0.75, 0.5]
  return required < 1 ? [1, Math.round((1 + required) * 10) / 20, required] : [required]
}
