import type { MarginSummary } from '../types/analysis'
import type { Criterion, CriterionQuantity } from '../types/criterion'
import type { ReportSnapshot, SnapshotCell } from '../types/snapshot'
import type { ComparedCell, ComparedQuantity, ComparedSide, RevisionComparison } from '../types/comparison'
import { breakPointChanges } from './breakPointChanges'
import { blockChanges } from './blockChanges'
import { isSameData } from './isSameData'

export type SnapshotComparison = Omit<RevisionComparison, 'before' | 'after'>

const keyOf = (cell: SnapshotCell) => `${cell.loopCode}\n${cell.conditionCode}`

const sideOf = (cell: SnapshotCell | undefined): ComparedSide | null => (cell === undefined
  ? null
  : {
      verdict: cell.judgement.verdict,
      closedLoop: cell.analysis?.stability.verdict ?? null,
      summary: cell.analysis?.summary ?? null,
      // A loop that is not shown to be stable has a distance but no margin.
      vectorMargin: cell.analysis?.summary ? cell.analysis.vectorMargin?.distance ?? null : null,
      sourceName: cell.source?.name ?? null,
    })

const difference = (before: number | null | undefined, after: number | null | undefined): number | null =>
  (before === null || before === undefined || after === null || after === undefined ? null : after - before)

function differencesOf(before: ComparedSide | null, after: ComparedSide | null): Record<ComparedQuantity, number | null> {
  const of = (quantity: keyof MarginSummary) => difference(before?.summary?.[quantity], after?.summary?.[quantity])
  return {
    gainIncrease: of('gainIncrease'),
    gainDecrease: of('gainDecrease'),
    phaseLag: of('phaseLag'),
    phaseLead: of('phaseLead'),
    delay: of('delay'),
    vectorMargin: difference(before?.vectorMargin, after?.vectorMargin),
  }
}

function compareCells(before: ReportSnapshot, after: ReportSnapshot): ComparedCell[] {
  const earlier = new Map(before.cells.map(cell => [keyOf(cell), cell]))
  const later = new Map(after.cells.map(cell => [keyOf(cell), cell]))
  const nameIn = (list: 'loops' | 'conditions', code: string) => [...after[list], ...before[list]].find(entry => entry.code === code)?.name ?? ''
  return [...new Set([...later.keys(), ...earlier.keys()])].flatMap((key): ComparedCell[] => {
    const was = earlier.get(key)
    const is = later.get(key)
    const one = is ?? was
    if (!one) return []
    const sides = { before: sideOf(was), after: sideOf(is) }
    return [{
      loopCode: one.loopCode,
      loopName: nameIn('loops', one.loopCode),
      conditionCode: one.conditionCode,
      conditionName: nameIn('conditions', one.conditionCode),
      ...sides,
      differences: differencesOf(sides.before, sides.after),
      verdictChanged: sides.before?.verdict !== sides.after?.verdict,
      changed: !isSameData(was, is),
    }]
  })
}

const missingIn = (list: readonly { code: string }[], other: readonly { code: string }[]) =>
  list.map(({ code }) => code).filter(code => !other.some(entry => entry.code === code))

const quantities: Record<CriterionQuantity, { name: string, unit: string }> = {
  gainMargin: { name: 'gain margin', unit: ' dB' },
  phaseMargin: { name: 'phase margin', unit: ' deg' },
  vectorMargin: { name: 'vector margin', unit: '' },
  delayMargin: { name: 'delay margin', unit: ' s' },
}

function criteriaChanges(before: readonly Criterion[], after: readonly Criterion[]): string[] {
  const words = (criteria: readonly Criterion[], quantity: CriterionQuantity) => {
    const limit = criteria.find(criterion => criterion.quantity === quantity)?.limit ?? null
    return limit === null ? 'no limit' : `${limit}${quantities[quantity].unit}`
  }
  return (Object.keys(quantities) as CriterionQuantity[])
    .filter(quantity => words(before, quantity) !== words(after, quantity))
    .map(quantity => `${quantities[quantity].name}: ${words(before, quantity)} to ${words(after, quantity)}`)
}

function parameterChanges(before: ReportSnapshot, after: ReportSnapshot): string[] {
  const words = ({ parameters }: ReportSnapshot, name: string, code: string) => {
    const values = parameters.find(parameter => parameter.name === name)?.values ?? {}
    // Own entries only: a condition may be called 'constructor'.
    return Object.hasOwn(values, code) ? String(values[code]) : 'none'
  }
  const names = [...new Set([...after.parameters, ...before.parameters].map(({ name }) => name))]
  const codes = [...new Set([...after.conditions, ...before.conditions].map(({ code }) => code))]
  return names.flatMap(name => codes
    .filter(code => words(before, name, code) !== words(after, name, code))
    .map(code => `parameter ${name} in ${code}: ${words(before, name, code)} to ${words(after, name, code)}`))
}

/**
 * What the later of two frozen states says differently from the earlier one, told from the snapshots alone. Loops and conditions are
 * matched by their codes; differences are after less before in the units of MarginSummary. Exact: a difference in the last digit is one.
 */
export function compareSnapshots(before: ReportSnapshot, after: ReportSnapshot): SnapshotComparison {
  return {
    loopsAdded: missingIn(after.loops, before.loops),
    loopsRemoved: missingIn(before.loops, after.loops),
    conditionsAdded: missingIn(after.conditions, before.conditions),
    conditionsRemoved: missingIn(before.conditions, after.conditions),
    criteriaChanges: criteriaChanges(before.criteria, after.criteria),
    parameterChanges: parameterChanges(before, after),
    blockChanges: blockChanges(before, after),
    breakPointChanges: breakPointChanges(before, after),
    cells: compareCells(before, after),
  }
}
