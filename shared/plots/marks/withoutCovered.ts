import type { MarkKind } from '../Figure'

/** px */
const covering = 4

/** Those of the marks, in order, that are not covered by an earlier one of their kind: of a hundred in one place one symbol is drawn, and all can be lit. */
export function withoutCovered<Mark extends { kind: MarkKind, x: number, y: number }>(marks: readonly Mark[]): Set<Mark> {
  const shown = new Set<Mark>()
  const taken = new Set<string>()
  for (const mark of marks) {
    const [column, row] = [Math.round(mark.x / covering), Math.round(mark.y / covering)]
    const key = `${mark.kind} ${column} ${row}`
    if (taken.has(key)) continue
    taken.add(key)
    shown.add(mark)
  }
  return shown
}
