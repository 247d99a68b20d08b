import { describeBlockGain } from '#shared/formatting/describeBlockGain'
import type { BlockGain } from '#shared/types/block'
import type { LoopInput } from '#shared/types/analysis'
import type { ReportSnapshot, SnapshotBlock, SnapshotCell } from '#shared/types/snapshot'
import { blockTables } from './blockTables'
import type { SectionView, TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Characters of a gain that are printed; the package holds the whole. */
const printedLength = 500

const blocksOf = (input: LoopInput | null): Record<string, BlockGain> => (input !== null && 'expression' in input && input.blocks) || {}
const isBuiltFrom = (input: LoopInput | null, name: string) => Object.hasOwn(blocksOf(input), name)
const shortened = (text: string) => (text.length <= printedLength ? text : `${text.slice(0, printedLength)} \u2026 (whole in snapshot.json of the package)`)

/** A unit of two words is not parted over lines. */
const unbroken = (unit: string) => unit.replaceAll(' ', '\u00a0')

/** As the engine was given it, where a loop uses it in that condition: it knows what stood in a file. */
function gainIn(snapshot: ReportSnapshot, block: SnapshotBlock, conditionCode: string): string {
  const used = snapshot.cells.find(cell => cell.conditionCode === conditionCode && isBuiltFrom(cell.input, block.name))
  const gain = blocksOf(used?.input ?? null)[block.name] ?? block.definitions[conditionCode]
  return gain === undefined ? '' : shortened(describeBlockGain(gain))
}

function fileIn(block: SnapshotBlock, conditionCode: string): string {
  const file = block.files?.[conditionCode]
  return file ? `file ${file.name}, SHA-256 ${file.sha256}` : ''
}

/** The gains of a block, conditions with the very same one together. */
function gainsOf(snapshot: ReportSnapshot, block: SnapshotBlock): { conditions: string[], words: string, file: string }[] {
  const gains: { conditions: string[], words: string, file: string, key: string }[] = []
  for (const { code } of snapshot.conditions) {
    const words = gainIn(snapshot, block, code)
    const file = fileIn(block, code)
    const key = JSON.stringify([words, file, block.definitions[code]])
    const same = gains.find(gain => gain.key === key)
    if (same) same.conditions.push(code)
    else gains.push({ conditions: [code], words, file, key })
  }
  return gains
}

function blocksTable(snapshot: ReportSnapshot, blocks: readonly SnapshotBlock[]): TableView {
  const everywhere = snapshot.conditions.length
  return tableOf({
    caption: 'The blocks, and the loops built from each',
    columns: [{ head: 'block' }, { head: 'role' }, { head: 'conditions' }, { head: 'gain', isWide: true }, { head: 'units', unit: 'out per in' }, { head: 'loops' }],
    rows: blocks.flatMap((block) => {
      const codes = (uses: (cell: SnapshotCell) => boolean) => snapshot.loops.filter(loop => snapshot.cells.some(cell => cell.loopCode === loop.code && uses(cell))).map(({ code }) => code)
      const ofRecord = codes(cell => isBuiltFrom(cell.input, block.name))
      const setAside = codes(cell => cell.otherSources?.some(other => isBuiltFrom(other.input, block.name)) ?? false).filter(code => !ofRecord.includes(code))
      const units = block.unitIn === '' && block.unitOut === '' ? '' : `${unbroken(block.unitOut || '1')} per ${unbroken(block.unitIn || '1')}`
      return gainsOf(snapshot, block).map(({ conditions, words, file }, index) => ({
        cells: [
          { text: index === 0 ? block.name : '', isHead: true, small: index === 0 ? block.notes : '' },
          { text: index === 0 ? block.role : '' },
          { text: conditions.length === everywhere ? 'all' : conditions.join(', ') },
          words === '' ? { text: 'no gain in this condition', tone: 'quiet' as const } : { text: words, small: file, isMono: block.definitions[conditions[0] ?? '']?.kind === 'expression' },
          { text: index === 0 ? units : '' },
          index === 0 ? { text: ofRecord.join(', ') || (setAside.length > 0 ? '' : 'none'), small: setAside.length > 0 ? `set aside: ${setAside.join(', ')}` : '' } : { text: '' },
        ],
      }))
    }),
    kind: 'blocks',
  })
}

/** How the loop gains are built: every block with its gain in each condition and the loops that use it. Null where no loop is built from blocks. */
export function blocksSection(snapshot: ReportSnapshot, number: string): SectionView | null {
  const { blocks = [] } = snapshot
  if (blocks.length === 0) return null
  return {
    number,
    anchor: 'blocks',
    title: 'How the loop gains are built',
    introduction: ['Each block is described once; the loop gains are expressions over their names, printed with the sources of each loop.'],
    blocks: [
      { title: '', paragraphs: [], items: [], table: blocksTable(snapshot, blocks) },
      ...blocks.flatMap(blockTables).map(table => ({ title: '', paragraphs: [], items: [], table })),
    ],
  }
}
