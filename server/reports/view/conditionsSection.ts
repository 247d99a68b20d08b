import type { ReportSnapshot } from '#shared/types/snapshot'
import { limitWords, quantityNames } from './criteriaWords'
import type { SectionView, TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Conditions whose parameter values stand side by side on one page. */
const conditionsPerTable = 6

function conditionsTable({ conditions }: ReportSnapshot): TableView {
  return tableOf({
    caption: 'Operating conditions',
    columns: [{ head: 'code' }, { head: 'name' }, { head: 'coordinates' }, { head: 'tags' }, { head: 'notes', isWide: true }],
    rows: conditions.map(condition => ({
      cells: [
        { text: condition.code, isHead: true },
        { text: condition.name },
        { text: condition.coordinates.map(({ name, unit, value }) => `${name} ${valueText(value)}${unit === '' ? '' : ` ${unit}`}`).join(', ') },
        { text: condition.tags.join(', ') },
        { text: condition.notes },
      ],
    })),
    notes: [],
    kind: 'conditions',
  })
}

function parameterTables({ parameters, conditions }: ReportSnapshot): TableView[] {
  const tables: TableView[] = []
  for (let from = 0; from < conditions.length; from += conditionsPerTable) {
    const shown = conditions.slice(from, from + conditionsPerTable)
    tables.push(tableOf({
      caption: shown.length === conditions.length ? 'Parameters and their values' : `Parameters and their values, conditions ${from + 1} to ${from + shown.length}`,
      columns: [{ head: 'parameter' }, { head: 'unit' }, ...shown.map(condition => ({ head: condition.code, isNumber: true })), { head: 'notes', isWide: true }],
      rows: parameters.map(parameter => ({
        cells: [
          { text: parameter.name, isHead: true, isMono: true },
          { text: parameter.unit },
          // Own entries only: a condition may be called 'constructor'.
          ...shown.map(({ code }) => ({ text: valueText(Object.hasOwn(parameter.values, code) ? parameter.values[code] : undefined) })),
          { text: parameter.notes },
        ],
      })),
      notes: [],
      kind: 'parameters',
    }))
  }
  return tables
}

const valueText = (value: number | undefined) => (value === undefined ? '' : String(Number(value.toPrecision(8))))

const criteriaTable = ({ criteria }: ReportSnapshot): TableView => tableOf({
  caption: 'Criteria',
  columns: [{ head: 'quantity' }, { head: 'limit' }],
  rows: criteria.map(({ quantity, limit }) => ({ cells: [{ text: quantityNames[quantity], isHead: true }, { text: limitWords(quantity, limit) }] })),
  notes: ['Limits agreed for this system. A margin is met when it is not smaller than its limit, in each direction.'],
  kind: 'criteria',
})

/** What the loops were judged against, the operating conditions, and the values the models took in each. */
export function conditionsSection(snapshot: ReportSnapshot, number: string): SectionView {
  return {
    number,
    anchor: 'conditions',
    title: 'Criteria, operating conditions and parameters',
    introduction: [],
    blocks: [criteriaTable(snapshot), conditionsTable(snapshot), ...(snapshot.parameters.length === 0 ? [] : parameterTables(snapshot))]
      .map(table => ({ title: '', paragraphs: [], items: [], table })),
  }
}
