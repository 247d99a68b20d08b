import type { ReportSnapshot } from '#shared/types/snapshot'
import type { Verdict } from '#shared/types/criterion'
import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import { formatDistance } from '#shared/formatting/formatDistance'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import { gainDecreaseCaution } from '#shared/formatting/gainDecreaseCaution'
import type { PlacedCell } from './cellsOf'
import { conditionAnchor, loopAnchor } from './anchorOf'
import { compareStanding } from './compareStanding'
import { formatMargin, limitOf, limitWords, marginKinds } from './criteriaWords'
import { rowOfKind } from './marginsTable'
import type { FigureView, SummaryView, TableView, Tone } from './ReportView'
import { tableOf } from './tableOf'
import { verdictTone } from './verdictTone'

/** Pairs named one by one on the summary's page; the matrix shows all. */
const namedPairs = 5

const pairs = (count: number) => `${count} ${count === 1 ? 'pair' : 'pairs'}`
const targetOf = ({ loop, loopIndex, conditionIndex }: PlacedCell) => conditionAnchor(loopAnchor(loopIndex, loop.code), conditionIndex)

function findingOf(cells: readonly PlacedCell[]): { finding: string, findingTone: Tone } {
  const count = (...verdicts: Verdict[]) => cells.filter(({ cell }) => verdicts.includes(cell.judgement.verdict)).length
  const total = cells.length
  const unstable = count('unstable')
  const notMet = count('not met')
  const open = count('not shown', 'no data')
  const accepted = count('not met, accepted by deviation')
  const parts = [
    ...(unstable > 0 ? [`${pairs(unstable)} ${unstable === 1 ? 'is' : 'are'} unstable`] : []),
    ...(notMet > 0 ? [`${pairs(notMet)} ${notMet === 1 ? 'does' : 'do'} not meet the criteria`] : []),
    ...(open > 0 ? [`${pairs(open)} ${open === 1 ? 'is' : 'are'} without data or not shown`] : []),
    ...(accepted > 0 ? [`${pairs(accepted)} not met, accepted by deviation`] : []),
  ]
  if (total > 0 && count('met, no limit') === total) {
    return { finding: `No limits are agreed, so none of the ${total} loop-condition pairs is judged; every closed loop is stable.`, findingTone: 'plain' }
  }
  if (parts.length === 0) return { finding: `All ${total} loop-condition pairs meet the criteria.`, findingTone: 'met' }
  return { finding: `Of ${total} loop-condition pairs, ${parts.join(', ')}.`, findingTone: unstable + notMet > 0 ? 'bad' : 'open' }
}

function worstTable(snapshot: ReportSnapshot, cells: readonly PlacedCell[]): TableView {
  const unit = snapshot.system.frequencyUnit
  const rows = marginKinds.map((kind) => {
    const candidates = cells.flatMap((placed) => {
      const row = placed.cell.analysis?.summary ? rowOfKind(placed.cell.judgement.rows, kind) : undefined
      return row && row.value !== null ? [{ placed, row, value: row.value }] : []
    })
    const name = kind.name
    const required = limitWords(kind.quantity, limitOf(snapshot.criteria, kind.quantity))
    const worst = candidates.reduce<(typeof candidates)[number] | null>((least, next) => (least === null || next.value < least.value ? next : least), null)
    if (worst === null) {
      return { cells: [{ text: name, isHead: true }, { text: 'none' }, { text: required }, { text: '' }, { text: '' }, { text: '' }, { text: '' }] }
    }
    const { placed, row, value } = worst
    return {
      cells: [
        { text: name, isHead: true },
        { text: formatMargin(kind.quantity, value), tone: row.limit === null ? 'plain' as const : verdictTone(row.verdict) },
        { text: required },
        { text: `${placed.loop.code} ${placed.loop.name}`, target: targetOf(placed) },
        { text: `${placed.condition.code} ${placed.condition.name}` },
        { text: row.driver === null ? '' : formatFrequency(row.driver.frequency) },
        { text: row.limit === null ? 'no limit' : row.verdict, tone: row.limit === null ? 'quiet' as const : verdictTone(row.verdict) },
      ],
    }
  })
  const without = cells.filter(({ cell }) => cell.analysis !== null && cell.analysis.summary === null).length
  return tableOf({
    caption: 'The smallest margin of each kind over every loop and condition',
    columns: [
      { head: 'margin' }, { head: 'smallest', isNumber: true }, { head: 'required' }, { head: 'loop' }, { head: 'condition' },
      { head: 'at', unit, isNumber: true }, { head: 'verdict' },
    ],
    rows,
    notes: without > 0 ? [`${pairs(without)} whose closed loop is not shown to be stable ${without === 1 ? 'has' : 'have'} no margins and ${without === 1 ? 'is' : 'are'} not in this table.`] : [],
    kind: 'worst',
  })
}

function reasonOf({ cell }: PlacedCell, unit: string): string {
  if (cell.failure) return `no analysis: ${cell.failure.message}`
  if (!cell.analysis) return 'no source of record'
  if (cell.analysis.summary === null) {
    const vector = cell.analysis.vectorMargin
    const distance = vector === null ? '' : `; comes to ${formatDistance(vector.distance)} of \u22121 at ${formatFrequency(vector.frequency)} ${unit}`
    return `closed loop ${cell.analysis.stability.verdict}${distance}`
  }
  const failing = marginKinds.flatMap((kind) => {
    const row = rowOfKind(cell.judgement.rows, kind)
    if (!row || row.value === null || row.limit === null || row.verdict === 'met') return []
    return [`${kind.name} ${formatMargin(kind.quantity, row.value)} (${limitWords(kind.quantity, row.limit)})`]
  })
  return failing.length > 0 ? failing.join('; ') : cell.judgement.reason ?? ''
}

function attentionTable(snapshot: ReportSnapshot, cells: readonly PlacedCell[]): TableView | null {
  const quiet: readonly Verdict[] = ['met', 'met, no limit', 'not applicable']
  const open = cells.filter(({ cell }) => !quiet.includes(cell.judgement.verdict)).sort((a, b) => compareStanding(a.cell, b.cell))
  if (open.length === 0) return null
  const left = open.length - namedPairs
  return tableOf({
    caption: 'What needs attention, the worst first',
    columns: [{ head: 'loop' }, { head: 'condition' }, { head: 'verdict' }, { head: 'why', isWide: true }],
    rows: open.slice(0, namedPairs).map(placed => ({
      cells: [
        { text: `${placed.loop.code} ${placed.loop.name}`, isHead: true, target: targetOf(placed) },
        { text: `${placed.condition.code} ${placed.condition.name}` },
        { text: placed.cell.judgement.verdict, tone: verdictTone(placed.cell.judgement.verdict) },
        { text: reasonOf(placed, snapshot.system.frequencyUnit) },
      ],
    })),
    notes: left > 0 ? [`${pairs(left)} more: see the matrix.`] : [],
    kind: 'attention',
  })
}

/** Every finite margin against falling gain is told: saturation and start-up use it up without anybody changing a gain. */
function gainFallStatement(cells: readonly PlacedCell[]): string[] {
  const falling = cells.flatMap(({ cell, loop, condition }) => {
    const decrease = cell.analysis?.summary?.gainDecrease ?? null
    return decrease === null ? [] : [{ size: Math.abs(decrease), summary: cell.analysis?.summary ?? null, place: `${loop.code} in ${condition.code}` }]
  })
  const least = falling.reduce<(typeof falling)[number] | null>((smallest, next) => (smallest === null || next.size < smallest.size ? next : smallest), null)
  if (least === null) return []
  const words = gainDecreaseCaution(least.summary) ?? ''
  return [`${falling.length === 1 ? '1 pair bears' : `${falling.length} pairs bear`} only so much loss of gain; the least is ${least.place}: ${words}. The anti-windup and the order of starting up must keep it.`]
}

/** The page a manager acts on: the answer, the counts, the worst of each margin, what needs attention, the crossing chart. */
export function summaryView(snapshot: ReportSnapshot, cells: readonly PlacedCell[], chart: FigureView | null): SummaryView {
  return {
    ...findingOf(cells),
    counts: verdictOrder
      .map(word => ({ word, tone: verdictTone(word), count: cells.filter(({ cell }) => cell.judgement.verdict === word).length }))
      .filter(({ count }) => count > 0),
    worst: worstTable(snapshot, cells),
    attention: attentionTable(snapshot, cells),
    chart,
    statements: [
      ...gainFallStatement(cells),
      'One loop at a time is opened, the others as stated in its chapter. A simultaneous change in several loops is not covered.',
      'Each operating condition is frozen: nothing is said of the way between two of them. Linear margins hold at the amplitude they were measured or modelled for.',
    ],
  }
}
