import type { BlockDefinition, ModalGain, SectionsDefinition } from '#shared/types/block'
import type { SnapshotBlock } from '#shared/types/snapshot'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Modes, or sections, of a table that are printed. */
const printedRows = 60

const outputs = { 0: 'positions', 1: 'rates', 2: 'accelerations' } as const
const figures = (values: readonly number[]) => values.map(value => String(Number(value.toPrecision(8)))).join(', ')
const leftWords = (count: number, noun: string) => (count > printedRows ? [`${count - printedRows} more ${noun} are in snapshot.json of this revision\u2019s package.`] : [])

function modesTable({ derivative, frequencyUnit, modes, rigid }: ModalGain, what: string): TableView {
  return tableOf({
    caption: `Modes of ${what}; its outputs are ${outputs[derivative]}`,
    columns: [{ head: 'mode' }, { head: 'frequency', unit: frequencyUnit, isNumber: true }, { head: 'damping', isNumber: true }, { head: 'gain in', isNumber: true }, { head: 'gain out', isNumber: true }],
    rows: [
      ...rigid.map(term => ({ cells: [{ text: `rigid, s^${term.power}`, isHead: true }, { text: '' }, { text: '' }, { text: figures(term.gainIn) }, { text: figures(term.gainOut) }] })),
      ...modes.slice(0, printedRows).map(mode => ({
        cells: [{ text: mode.name, isHead: true }, { text: String(mode.frequency) }, { text: String(mode.damping) }, { text: figures(mode.gainIn) }, { text: figures(mode.gainOut) }],
      })),
    ],
    notes: leftWords(modes.length, 'modes'),
    kind: 'modes',
  })
}

function sectionsTable({ gain, rows }: SectionsDefinition, what: string): TableView {
  return tableOf({
    caption: `Second-order sections of ${what}, as coded; gain ${gain}`,
    columns: [{ head: 'section' }, ...['b0', 'b1', 'b2', 'a0', 'a1', 'a2'].map(head => ({ head, isNumber: true }))],
    rows: rows.slice(0, printedRows).map((row, index) => ({ cells: [{ text: String(index + 1), isHead: true }, ...row.map(text => ({ text, isMono: true }))] })),
    notes: ['Each section is (b0 + b1/z + b2/z\u00b2)/(a0 + a1/z + a2/z\u00b2).', ...leftWords(rows.length, 'sections')],
    kind: 'sections',
  })
}

/** The numbers behind a block that a line cannot hold, modes and second-order sections, one table for the conditions that share them. */
export function blockTables({ name, definitions }: SnapshotBlock): TableView[] {
  const shared = new Map<string, { definition: BlockDefinition, conditions: string[] }>()
  for (const [condition, definition] of Object.entries(definitions)) {
    const key = JSON.stringify(definition)
    const known = shared.get(key)
    if (known) known.conditions.push(condition)
    else shared.set(key, { definition, conditions: [condition] })
  }
  return [...shared.values()].flatMap(({ definition, conditions }) => {
    const what = shared.size === 1 ? name : `${name} in ${conditions.join(', ')}`
    switch (definition.kind) {
      case 'modal': return [modesTable(definition, what)]
      case 'sections': return [sectionsTable(definition, what)]
      default: return []
    }
  })
}
