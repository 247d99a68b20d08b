import { describeBreakPoint } from '#shared/formatting/describeBreakPoint'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { markdownToHtml } from '../text/markdownToHtml'
import { safeHtml } from '../text/SafeHtml'
import { conditionAnchor, loopAnchor } from './anchorOf'
import type { PlacedCell } from './cellsOf'
import { closedLoopWords } from './closedLoopWords'
import { compareStanding } from './compareStanding'
import { coverageWords, gapsTable } from './coverageWords'
import { crossingsTable } from './crossingsTable'
import { differencesTable } from './differencesTable'
import { marginsTable } from './marginsTable'
import type { ChapterView, ConditionView, FigureView } from './ReportView'
import { sourcesTable } from './sourcesTable'
import { structureWords } from './structureWords'
import { verdictTone } from './verdictTone'

function conditionView({ cell, condition, conditionIndex, loop, loopIndex }: PlacedCell): ConditionView {
  const { analysis, source, failure, judgement } = cell
  const isMeasured = source?.kind === 'measured'
  const common = {
    anchor: conditionAnchor(loopAnchor(loopIndex, loop.code), conditionIndex),
    title: `${condition.code} ${condition.name}`,
    verdict: judgement.verdict,
    tone: verdictTone(judgement.verdict),
  }
  if (!analysis) {
    const why = failure === null ? 'There is no source of record for this loop in this condition.' : `There is no analysis: ${failure.message}`
    return { ...common, closedLoop: why, coverage: [], coverageTone: 'open', crossings: null, gaps: null, differences: null, structure: [], structureTone: 'plain' }
  }
  const crossings = crossingsTable(analysis)
  return {
    ...common,
    closedLoop: closedLoopWords(analysis.stability),
    coverage: [...coverageWords(analysis, isMeasured), ...(crossings === null ? ['No crossing and no closest approach was found.'] : [])],
    coverageTone: analysis.coverage.proven || (isMeasured && analysis.coverage.exceptions.length === 0) ? 'plain' : 'open',
    crossings,
    gaps: gapsTable(analysis, isMeasured),
    differences: differencesTable(cell),
    structure: [...(cell.disagreement ? [cell.disagreement] : []), ...structureWords(analysis)],
    structureTone: cell.disagreement ? 'bad' : 'plain',
  }
}

/** The condition of a loop that its large figures show: the one that stands worst and has an analysis; null where none has. */
export function governingCell(cells: readonly PlacedCell[]): PlacedCell | null {
  const analysed = cells.filter(({ cell }) => cell.analysis !== null)
  return analysed.sort((a, b) => compareStanding(a.cell, b.cell))[0] ?? null
}

/** One loop's chapter. `cells` are this loop's, in order of conditions. */
export function chapterView(snapshot: ReportSnapshot, cells: readonly PlacedCell[], loopIndex: number, number: string, figures: FigureView[], otherFigures: FigureView[], leftOut: number): ChapterView {
  const loop = snapshot.loops[loopIndex]
  if (!loop) throw new RangeError(`there is no loop ${loopIndex} in the snapshot`)
  const worst = [...cells].sort((a, b) => compareStanding(a.cell, b.cell))[0]
  const governing = governingCell(cells)
  return {
    number,
    anchor: loopAnchor(loopIndex, loop.code),
    pageName: `loop-${loopIndex + 1}`,
    code: loop.code,
    name: loop.name,
    verdict: worst ? `${worst.cell.judgement.verdict} at worst, in ${worst.condition.code}` : 'no conditions',
    tone: worst ? verdictTone(worst.cell.judgement.verdict) : 'open',
    facts: [
      { name: 'Axis', value: loop.axis },
      { name: 'Break point', value: describeBreakPoint({ ...loop, states: loop.loopStates ?? [] }) },
      { name: 'Notes', value: loop.notes },
    ].filter(({ value }) => value !== ''),
    remarks: loop.remarks === '' ? safeHtml('') : markdownToHtml(loop.remarks),
    margins: marginsTable(cells, snapshot.criteria, snapshot.system.frequencyUnit),
    sources: sourcesTable(cells),
    governing: governing ? `${governing.condition.code} ${governing.condition.name}` : '',
    figures,
    otherFigures,
    notDrawn: leftOut === 0 ? '' : `The conditions that stand worst are drawn; ${leftOut} more ${leftOut === 1 ? 'is' : 'are'} in the tables alone.`,
    conditions: cells.map(conditionView),
  }
}
