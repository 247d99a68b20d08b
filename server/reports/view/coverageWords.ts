import type { FrequencyUnit, LoopAnalysis } from '#shared/types/analysis'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Stretches printed for one loop in one condition; the package holds every one. */
const printedStretches = 30

const band = ({ coverage }: LoopAnalysis, unit: FrequencyUnit) => `from ${formatFrequency(coverage.from)} to ${formatFrequency(coverage.to, unit)}`

/** What is proven of the lists of one analysis, in words. */
export function coverageWords(analysis: LoopAnalysis, isMeasured: boolean): string[] {
  const { coverage, frequencyUnit } = analysis
  const range = band(analysis, frequencyUnit)
  if (coverage.proven) return [`Proven: ${range} the lists hold every crossing and every closest approach.`]
  const stretches = coverage.exceptions.length
  if (!isMeasured) {
    return [`Not proven: ${range} it is not shown that the lists hold every crossing${stretches === 0 ? '' : `; ${stretches === 1 ? 'the stretch' : `the ${stretches} stretches`} concerned ${stretches === 1 ? 'is' : 'are'} listed below`}.`]
  }
  return stretches === 0
    ? [`Measured ${range}: every gap between samples is narrow enough to trust. Measured data prove nothing between their samples.`]
    : [`Measured ${range}: ${stretches === 1 ? 'one gap' : `${stretches} gaps`} between samples cannot be trusted and ${stretches === 1 ? 'is' : 'are'} listed below. A crossing there may have been missed.`]
}

/** The stretches an analysis does not answer for; null where there are none. */
export function gapsTable(analysis: LoopAnalysis, isMeasured: boolean): TableView | null {
  const { exceptions } = analysis.coverage
  if (exceptions.length === 0) return null
  const left = exceptions.length - printedStretches
  return tableOf({
    caption: isMeasured ? 'Gaps between samples that cannot be trusted' : 'Stretches that are not proven',
    columns: [
      { head: 'from', unit: analysis.frequencyUnit, isNumber: true },
      { head: 'to', unit: analysis.frequencyUnit, isNumber: true },
      { head: 'why', isWide: true },
    ],
    rows: exceptions.slice(0, printedStretches).map(({ from, to, reason }) => ({
      cells: [{ text: formatFrequency(from) }, { text: formatFrequency(to) }, { text: reason }],
    })),
    notes: left > 0 ? [`${left} more are in tables/coverage.csv of this revision's package.`] : [],
    kind: 'gaps',
  })
}
