import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import { formatPhaseChange } from '#shared/formatting/formatPhaseChange'
import { significantDigits } from '#shared/formatting/significantDigits'
import type { SnapshotCell } from '#shared/types/snapshot'
import type { DifferenceBand } from '#shared/types/structure'
import type { TableView } from './ReportView'
import type { CellDraft } from './tableOf'
import { tableOf } from './tableOf'

/** From this part of the distance to \u22121 on a difference alone could decide a margin. */
const tellingRatio = 0.5

const gainWords = (difference: number) => (difference === 0 ? '0 dB' : `${formatDecibels(difference)} ${difference > 0 ? 'higher' : 'lower'}`)

function bandCells({ from, to, gain, phase, relative }: DifferenceBand): CellDraft[] {
  const at = (frequency: number) => `at ${formatFrequency(frequency)}`
  return [
    { text: `${formatFrequency(from)} to ${formatFrequency(to)}` },
    { text: gainWords(gain.difference), small: at(gain.frequency) },
    { text: formatPhaseChange(phase.difference), small: at(phase.frequency) },
    { text: significantDigits(relative.ratio, 3), small: at(relative.frequency), tone: relative.ratio >= tellingRatio ? 'open' : 'plain' },
  ]
}

/** How far the sources set aside lie from the one of record, band by band. Null where there is none to compare. */
export function differencesTable({ source, otherSources = [] }: SnapshotCell): TableView | null {
  const compared = otherSources.flatMap(other => (other.difference && other.difference.reason === null ? [{ other, difference: other.difference }] : []))
  const [first] = compared
  if (!first) return null
  return tableOf({
    caption: `Other sources less ${source?.name ?? 'the source of record'}, the largest difference of each band`,
    columns: [
      { head: 'source' }, { head: 'band', unit: first.difference.frequencyUnit }, { head: 'gain' }, { head: 'phase' },
      { head: 'of the distance to \u22121', isNumber: true },
    ],
    rows: compared.flatMap(({ other, difference }) => difference.bands.map((band, index) => ({
      cells: [{ text: index === 0 ? other.name : '', isHead: true }, ...bandCells(band)],
    }))),
    notes: [
      'The last column is |difference of L| over |1 + L| of the source of record: at 1 the difference alone could reach \u22121.',
      ...new Set(compared.map(({ difference }) => difference.basis).filter(basis => basis !== '')),
    ],
    kind: 'differences',
  })
}
