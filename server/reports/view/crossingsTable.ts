import type { ApproximationDifference, ListedFrequency, LoopAnalysis } from '#shared/types/analysis'
import { describeApproximation } from '#shared/formatting/describeApproximation'
import { formatDistance } from '#shared/formatting/formatDistance'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatDegrees } from '#shared/formatting/formatDegrees'
import { formatGainChange } from '#shared/formatting/formatGainChange'
import { formatPhaseChange } from '#shared/formatting/formatPhaseChange'
import { significantDigits } from '#shared/formatting/significantDigits'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'
import type { CellDraft } from './tableOf'
import { withoutUnit } from './withoutUnit'

/** Crossings and approaches printed for one loop in one condition; the package holds every one. */
const printedRows = 200

/** Dips no deeper than the noise of the samples have rows of their own while they are as few as this; else one line tells where they are. */
const noisyRows = 3

interface Entry {
  frequency: ListedFrequency
  what: string
  slope: string
  margin: CellDraft
  delay: string
  distance: string
  change: string
  approximation: string
}

const order = (frequency: ListedFrequency) => (frequency === 'infinity' ? Infinity : frequency)
const distanceText = (distance: number | undefined) => (distance === undefined ? '' : formatDistance(distance))

/** 'lag 32.3': the unit stands in the head. */
const phaseText = (degrees: number) => (degrees === 0 ? 'none' : `${degrees > 0 ? 'lag' : 'lead'} ${withoutUnit(formatDegrees(degrees))} deg`)
const gainText = (decibels: number) => (decibels === 0 ? 'none' : `gain may ${decibels > 0 ? 'rise' : 'fall'} ${withoutUnit(formatDecibels(decibels))} dB`)

/** The head says of what it tells. */
const approximationText = ({ approximation }: { approximation?: ApproximationDifference }) => (approximation === undefined ? '' : describeApproximation(approximation).replace(/^approximation: /, ''))

function entriesOf(analysis: LoopAnalysis, approaches: LoopAnalysis['closestApproaches']): Entry[] {
  const entries: Entry[] = [
    ...analysis.gainCrossovers.map((crossing): Entry => ({
      frequency: crossing.frequency,
      what: 'gain crossover',
      slope: `gain ${crossing.slope}`,
      margin: { text: phaseText(crossing.phaseMargin) },
      delay: significantDigits(crossing.delayMargin * 1000, 3),
      distance: distanceText(crossing.distance),
      change: '',
      approximation: approximationText(crossing),
    })),
    ...analysis.phaseCrossovers.map((crossing): Entry => ({
      frequency: crossing.frequency,
      what: 'phase crossover',
      slope: `phase ${crossing.slope}`,
      margin: { text: gainText(crossing.gainMargin) },
      delay: '',
      distance: distanceText(crossing.distance),
      change: '',
      approximation: approximationText(crossing),
    })),
    ...approaches.map((approach): Entry => ({
      frequency: approach.frequency,
      what: 'closest approach',
      slope: '',
      margin: { text: '' },
      delay: '',
      distance: formatDistance(approach.distance),
      change: `${formatGainChange(approach.gainChange)}, ${formatPhaseChange(approach.phaseChange)}`,
      approximation: approximationText(approach),
    })),
  ]
  // The sort keeps gain crossovers before phase crossovers before approaches at one frequency.
  return entries.sort((a, b) => order(a.frequency) - order(b.frequency) || 0)
}

/** The closest approaches that noise alone would make, where they are so many that they would hide the others; never the vector margin. */
function noiseOf({ closestApproaches, vectorMargin }: LoopAnalysis): LoopAnalysis['closestApproaches'] {
  const noisy = closestApproaches.filter(({ withinNoise, frequency }) => withinNoise === true && frequency !== vectorMargin?.frequency)
  return noisy.length > noisyRows ? noisy : []
}

function noiseNote(noisy: LoopAnalysis['closestApproaches'], unit: string): string {
  const shown = noisy.slice(0, printedRows).map(({ frequency }) => formatFrequency(frequency))
  const least = Math.min(...noisy.map(({ distance }) => distance))
  return `${noisy.length} more closest approaches are no deeper than the noise of the samples, none nearer than ${formatDistance(least)}: at ${shown.join(', ')}${shown.length < noisy.length ? ' and on' : ''} ${unit}; their values are in the package.`
}

/**
 * Every crossing and closest approach of one analysis in order of frequency. Where the closed loop is not stable there are no
 * margins: only places and distances to -1 are printed. Null where the analysis found nothing.
 */
export function crossingsTable(analysis: LoopAnalysis): TableView | null {
  const hasMargins = analysis.summary !== null
  const isApproximated = analysis.structure?.approximated === true
  const noisy = noiseOf(analysis)
  const entries = entriesOf(analysis, analysis.closestApproaches.filter(approach => !noisy.includes(approach)))
  if (entries.length === 0) return null
  const left = entries.length - printedRows
  const columns = [
    { head: 'frequency', unit: analysis.frequencyUnit, isNumber: true },
    { head: 'what' },
    { head: 'slope' },
    ...(hasMargins ? [{ head: 'margin here' }, { head: 'delay', unit: 'ms', isNumber: true }] : []),
    { head: 'distance', unit: '|1 + L|', isNumber: true },
    ...(hasMargins ? [{ head: 'one change that reaches \u22121', isWide: true }] : []),
    ...(isApproximated ? [{ head: 'continuous approximation' }] : []),
  ]
  const rows = entries.slice(0, printedRows).map(entry => ({
    isMarked: entry.what === 'closest approach',
    cells: [
      { text: formatFrequency(entry.frequency) },
      { text: entry.what },
      { text: entry.slope },
      ...(hasMargins ? [entry.margin, { text: entry.delay }] : []),
      { text: entry.distance },
      ...(hasMargins ? [{ text: entry.change }] : []),
      ...(isApproximated ? [{ text: entry.approximation }] : []),
    ],
  }))
  const notes = [
    ...(hasMargins ? [] : ['The closed loop is not shown to be stable, so there are no margins: distances to \u22121 only.']),
    ...(noisy.length > 0 ? [noiseNote(noisy, analysis.frequencyUnit)] : []),
    ...(isApproximated ? ['The last column says what the continuous approximation, controller times hold, delay and plant, would add to the loop gain found here; it judges nothing.'] : []),
    ...(left > 0 ? [`${left} more are in tables/crossings.csv and tables/closest-approaches.csv of this revision's package.`] : []),
  ]
  return tableOf({ caption: 'Every crossing and closest approach, in order of frequency', columns, rows, notes, kind: 'crossings' })
}
