import type { CrossingChartData, RowStanding } from '../FigureData'
import { countWords, sentences } from './captionWords'

const told: [RowStanding, string][] = [
  ['unstable', 'unstable'], ['not met', 'not met'], ['not shown', 'not shown'], ['no data', 'without data'], ['accepted', 'accepted by deviation'],
]

/** What there is to see in a crossing chart. */
export function captionOfCrossingChart({ condition, rows }: CrossingChartData): string {
  const counts = told.map(([standing, words]) => ({ words, count: rows.filter(row => row.standing === standing).length }))
    .filter(({ count }) => count > 0)
    .map(({ words, count }) => `${count} ${words}`)
  const hatched = rows.some(row => (row.analysis?.coverage.exceptions.length ?? 0) > 0)
  return sentences(
    `Where every loop crosses, ${condition}: ${countWords(rows.length, 'loop')} on one axis of frequency. A bar is where the gain is above one, each of its edges a gain crossover; a tick is a phase crossover; a circle is a closest approach with its distance to −1. Numbers that would cover others are left to the tables.`,
    counts.length > 0 ? `Of the loops, ${counts.join(', ')}.` : '',
    hatched ? 'Hatched: stretches where nothing can be shown.' : '',
  )
}
