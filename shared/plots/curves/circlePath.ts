/** Path data of a whole circle, px. */
export function circlePath(x: number, y: number, radius: number): string {
  const [cx, cy, r] = [x, y, radius].map(value => Math.round(value * 10) / 10) as [number, number, number]
  return `M${tenth(cx - r)} ${cy}a${r} ${r} 0 1 0 ${tenth(2 * r)} 0a${r} ${r} 0 1 0 ${tenth(-2 * r)} 0Z`
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
